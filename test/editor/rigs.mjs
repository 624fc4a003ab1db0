// The rigs that the scenarios open: small, so that all of one fits on the screen, and of known findings.

/** One channel whose rate folds an inverter's carrier into the band: one error (at the rate), two warnings, one hint. */
export const FAN = `rig: Extract fan endurance, cell 2
mains: 50 Hz

clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128, tolerance: 25 ppm }

digitizers:
  front-end: { clock: chassis, prescale: 256, bits: 24, full-scale: ±10 V }

filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
  tidy: { response: kaiser, pass: 0.2 fs, stop: 0.3 fs, stopband: 90 dB }

sensors:
  stud-mounted: { measures: acceleration, sensitivity: 100 mV/g, resonance: 27 kHz, range: 50 g }

sources:
  blade-pass: { order: 9, speed: 600..3000 rpm, harmonics: 4, level: 2 g, falls: 6 dB/oct, wanted: true }
  inverter: { carrier: 16 kHz, modulation: 50 Hz, sidebands: 2, level: 400 mV, sidebands-fall: 6 dB }

channels:
  bearing-drive-end:
    sensor: stud-mounted
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10 kHz
    fold-limit: -80 dBFS
    peak: 40 g
`;

/** The line of the rate in {@link FAN}, from 1, and the column of its value, from 1. */
export const FAN_RATE = { line: 25, column: 11 };

/** The same with a second channel of the same fault. */
export const TWO_CHANNELS = `${FAN}
  bearing-far-end:
    sensor: stud-mounted
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10 kHz
    fold-limit: -80 dBFS
    peak: 40 g
`;
