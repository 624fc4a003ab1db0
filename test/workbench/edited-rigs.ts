/** Rigs in which an edit of one place changes what is said of another. */

/** Channels that stand for many, each sharing names with another after an edit or two. */
export const RANGES = `rig: Ranges
digitizers:
  d: { together: same, full-scale: ±1 V }
sources:
  hum: { frequency: 950 Hz, level: 1 V }
  shake: { frequency: 90 Hz, level: 1 g }
defaults: { digitizer: d, rate: 1000 Hz }
channels:
  s-1: { band: 1 Hz .. 100 Hz }
  s-{2..5}: &many { band: 1 Hz .. 100 Hz }
  t-{01..03}{1..2}: { band: 1 Hz .. 200 Hz, rate: 2000 Hz }
  "u-{1..15000}": *many
`;

/** What is accepted of one channel depends on its name, on what is found of it, and on another place of the file. */
export const ACCEPTED = `rig: Accepted
digitizers:
  d: { together: same, full-scale: ±1 V }
filters:
  card: { response: rc, order: 1, corner: 100 Hz }
sources:
  hum: { frequency: 950 Hz, level: 1 V }
accept:
  - { finding: fold-in-band, on: a, about: hum, reason: known }
  - finding: band-droop
    on: "s-{1..4}"
    reason: corrected afterwards
    by: test lead
    until: 2026-12-01
  - { finding: fold-in-band, on: "s-*", reason: known, until: 2026-11-30 }
  - { finding: rates-conflict, reason: "" }
  - { finding: unused-name, about: card, reason: kept }
channels:
  a: { digitizer: d, rate: 1000 Hz, band: 1 Hz .. 100 Hz }
  s-{1..4}: { digitizer: d, rate: 1000 Hz, band: 1 Hz .. 200 Hz, filter: card }
  s-5: { digitizer: d, rate: 2000 Hz, band: 1 Hz .. 100 Hz }
checks: { acceptance-idle: warning }
`;

/** Whatever is folded over several channels because of time: a scan, a group, clocks that drift. */
export const TIMED = `rig: Timed
clocks:
  near: { frequency: 10 MHz, tolerance: 10 ppm }
  far: { frequency: 10 MHz, tolerance: 10 ppm }
digitizers:
  scanner: { clock: near, sampling: scanned, settling: 20 us, max-rate: 25 kHz, bits: 16, full-scale: ±10 V }
  box: { clock: far, bits: 16, full-scale: ±10 V }
filters:
  one: { response: rc, order: 1, corner: 1 kHz }
  other: { response: rc, order: 1, corner: 1.1 kHz }
groups:
  tower: { within: 0.1 deg, up-to: 100 Hz }
run: { duration: 8 h }
defaults: { rate: 10 kHz, band: 1 Hz .. 100 Hz, group: tower, filter: one }
channels:
  base: { digitizer: scanner }
  middle:
    digitizer: scanner
    filter: other
  top:
    digitizer: box
    rate: 20 kHz
`;

/** Spectra and a run with something wrong in each. */
export const SPECTRA = `rig: Spectra
run: { duration: 2 s, disk: 10 kB, link: 1 kB/s }
digitizers: { d: { bits: 24, full-scale: ±10 V } }
sources:
  tone: { frequency: 500 Hz, level: 5 V, harmonics: 2, wanted: true }
  hum: { frequency: 2056 Hz, level: 1 V }
  shaft: { order: 1, speed: 600..3000 rpm, harmonics: 3, level: 1 mV, wanted: true }
defaults: { digitizer: d, rate: 2560 Hz, band: 0 Hz .. 1 kHz, spectrum: { lines: 100, averages: 99 } }
channels:
  a: { resolve: 1 mV }
  b:
    spectrum:
      record: 250 ms
      window: rectangle
      separate: 3 Hz
  c: { then: [{ decimate: 2 }], spectrum: { resolution: 10 Hz, overlap: 50 %, averages: 40 } }
`;

/** Noise from everything that can make it, too much of each. */
export const NOISE = `rig: Noise
digitizers: { d: { bits: 10, full-scale: ±10 V, noise: 2 mV, jitter: 1 us } }
filters: { card: { response: rc, order: 1, corner: 2 kHz } }
sensors: { stud: { sensitivity: 100 mV/g, resonance: 20 kHz, noise: 30 ug/rtHz } }
sources:
  hiss: { noise: 300 uV/rtHz, spans: 3 kHz .. 40 kHz }
  rumble: { noise: 1 mg/rtHz, spans: 1 Hz .. 90 Hz }
defaults: { digitizer: d, rate: 10 kHz, band: 1 Hz .. 1 kHz, sensor: stud, resolve: 50 mg, peak: 40 g }
channels:
  bare: { hears: { rumble: none } }
  filtered:
    filter: card
    then: [{ decimate: 4 }]
`;
