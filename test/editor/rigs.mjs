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

/** What else a chain has: samples left out in a pattern, noise, and channels that are compared. */
export const WHOLE_CHAIN = `rig: Tower sway, north leg
digitizers:
  logger: { bits: 16, full-scale: ±1 V, noise: 40 uV }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 42 Hz }
  gentle: { response: bessel, order: 2, cutoff: 40 Hz }
sensors:
  servo: { measures: acceleration, sensitivity: 1 V/g, noise: 2 ug/rtHz, resonance: 400 Hz }
sources:
  sway: { frequency: 13 Hz, level: 0.2 g, wanted: true }
groups:
  leg: { within: 5 deg, up-to: 20 Hz }
defaults: { sensor: servo, digitizer: logger, undeclared: -60 dBFS }
channels:
  strut:
    rate: 100 Hz
    filter: card
    band: 1 Hz .. 40 Hz
    pattern: { of: 10, take: [0, 1, 2, 3, 4, 5, 6] }
  top:
    rate: 200 Hz
    filter: card
    band: 1 Hz .. 40 Hz
    group: leg
  base:
    rate: 200 Hz
    filter: gentle
    band: 1 Hz .. 10 Hz
    group: leg
`;
