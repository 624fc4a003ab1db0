/**
 * A small rig with one error, whose figures can be worked out by hand: a hum at 17 kHz folds to 20 kHz - 17 kHz = 3 kHz,
 * inside the band. 1 V of ±10 V is -20 dBFS, and a Butterworth filter of order 8 at 6 kHz takes
 * 10 log10(1 + (17/6)^16) = 72.37 dB off, which leaves -92.37 dBFS.
 */
export const FOLDS = `rig: Bench
digitizers:
  d: { bits: 16, full-scale: ±10 V, rates: [20 kHz, 25 kHz, 40 kHz] }
filters:
  card: { response: butterworth, order: 8, cutoff: 6 kHz }
sources:
  hum: { frequency: 17 kHz, level: 1 V }
channels:
  a:
    measures: voltage
    digitizer: d
    rate: 20 kHz      # as wired
    filter: card
    band: 10 Hz .. 4 kHz
    fold-limit: -96 dBFS
`;

/** Sampled so fast that nothing folds into the band: no finding at all. */
export const CLEAN = FOLDS.replace('rate: 20 kHz ', 'rate: 40 kHz ');

/** In between: one warning, `filter-short`. */
export const WARNS = FOLDS.replace('rate: 20 kHz ', 'rate: 25 kHz ');

/** One hint: a filter that nothing names. */
export const HINTS = CLEAN.replace(
  'sources:\n',
  '  spare: { response: butterworth, order: 2, cutoff: 1 kHz }\nsources:\n',
);

/** What `FOLDS` has, and a misspelled key, which a correction of the text sets right. */
export const MISSPELLED = `${FOLDS}    flatnes: 1 dB\n`;

/** The same with the key spelled right. */
export const SPELLED = `${FOLDS}    flatness: 1 dB\n`;
