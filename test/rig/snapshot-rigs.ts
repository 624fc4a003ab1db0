/** Rigs of our own that the tests of reading and editing start from: every way of writing that people use. */

export const BLOCK_RIG = `# Cell 2, as wired in spring
rig: Extract fan endurance, cell 2
mains: 50 Hz

clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128, tolerance: 25 ppm }

digitizers:
  front-end: { clock: chassis, prescale: 256, bits: 24, full-scale: ±10 V }

filters:
  card: { response: butterworth, order: 6, cutoff: 8 kHz }
  tidy:
    response: kaiser   # digital
    pass: 0.2 fs
    stop: 0.3 fs
    stopband: 90 dB
  measured:
    response: points
    points:
    - [1 kHz, 0.1 dB]
    - [8 kHz, 3 dB]
    - [16 kHz,
       40 dB]

sensors: # hand-written
  # the usual ones
  stud-mounted: &stud { measures: acceleration, sensitivity: 100 mV/g, resonance: 27 kHz, range: 50 g }
  'glued': { <<: *stud, resonance: 18 kHz }

sources:
  blade-pass: { order: 9, speed: 600..3000 rpm, harmonics: 4, level: 2 g, falls: 6 dB/oct, wanted: true }
  "inverter": { carrier: 16 kHz, modulation: 50 Hz, sidebands: 2, level: 400 mV, sidebands-fall: 6 dB }

defaults: &defaults
  digitizer: front-end
  flatness: 1 dB

channels:
  bearing-drive-end:
    sensor: stud-mounted
    digitizer: front-end
    rate: 25.6 kHz
    filter: card
    band: 10 Hz .. 10 kHz
    fold-limit: -80 dBFS
    peak: 40 g

  bearing-far-end: &far
    sensor: "glued"
    rate: '25.6 kHz'
    band: 10 Hz .. 5 kHz
    note: it''s said: "no"
    # a comment inside
    then:
      - { decimate: 2, filter: tidy }
      - decimate: 5
        filter: tidy
  casing:
    <<: *far
    note: |
      first line
        deeper: line

      # no comment
    hears:
      inverter: 20 mV
      blade-pass: none
  empty:
  folded:
    note: >-
      one
      two
    rate: 1024 Hz
    band:
      0 Hz ..
      400 Hz

run: { duration: 2 h, disk: 400 GB }
checks:
  filter-short: off
  range-wasted: hint
`;

export const FLOW_RIG = `# written by a script
{ rig: Small rig, mains: { frequency: 50 Hz, level: 5 mV },
  clocks: { chassis: { frequency: 13.1072 MHz, divide: 1..128 } },
  sensors: { stud: &s { measures: acceleration, sensitivity: 100 mV/g }, other: *s, "third": { <<: *s, range: 50 g } },
  channels: {
    one: { sensor: stud, rate: 25.6 kHz, then: [{ decimate: 2 }, { decimate: 5, filter: none }] }, # a comment
    two: { sensor: other, rate: '1 kHz', band: 0..400 Hz, note: "said \\"no\\"" },
    three: { rate: 1 kHz, band: 10 Hz .. 400 Hz, hears: [a, b] },
    four,
    five:,
  },
}
`;

export const JSON_RIG = `{
  "rig": "Small rig",
  "mains": "50 Hz",
  "clocks": { "chassis": { "frequency": "13.1072 MHz", "divide": "1..128" } },
  "filters": {},
  "channels": {
    "one": { "sensor": "stud", "rate": "25.6 kHz", "then": [{ "decimate": 2 }] },
    "two": {
      "rate": "1 kHz",
      "band": "0..400 Hz", "note": "tab\\tand \\u00b5"
    },
\t"three": { "rate": "1 kHz", "wanted": true, "gain": -1.5e3, "none": null, "hears": [] }
  }
}
`;

export const ODD_RIG = `%YAML 1.2
--- # start
rig: "Odd
  but whole"
channels: { a: { rate: 1 kHz }, b: { rate: 2 kHz,
  band: 0..1 kHz }, c: {} }
sources:
  - tone
  - other
filters: &f
    wide:
        response: rc
    narrow: &n
        response: rc
        order: 2
    __proto__: *n
    constructor: { order: 1 }
sensors: none
clocks: {
  a: { frequency: 1 MHz }
}
groups:
\ttabbed:
\t\twithin: 5 deg
---
run:
- x
...
checks: { a: off }
`;

export const RIGS: readonly (readonly [name: string, text: string])[] = [
  ['block', BLOCK_RIG],
  ['flow', FLOW_RIG],
  ['json', JSON_RIG],
  ['odd', ODD_RIG],
  ['block with CRLF', BLOCK_RIG.replaceAll('\n', '\r\n')],
  ['odd with BOM', `\uFEFF${ODD_RIG}`],
];
