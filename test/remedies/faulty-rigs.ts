import fc from 'fast-check';

/** Rigs with faults that people make, in the styles that they write in. */
export const faultyRig: fc.Arbitrary<string> = fc
  .record({
    rates: fc.array(fc.constantFrom('12.8 kHz', '25.6 kHz', '6400 Hz', '3.2 kHz', '5 kHz', "'10.24 kHz'", '8000'), {
      minLength: 1,
      maxLength: 4,
    }),
    carrier: fc.constantFrom('16 kHz', '9.7 kHz', '24.9 kHz', '5.1 kHz'),
    level: fc.constantFrom(', level: 400 mV', ', level: 2 V', '', ', level: 0.5 g'),
    order: fc.integer({ min: 1, max: 8 }),
    response: fc.constantFrom('butterworth', 'bessel', 'chebyshev'),
    cutoff: fc.constantFrom('2 kHz', '4 kHz', '8 kHz', '0.4 fs'),
    band: fc.constantFrom('10 Hz .. 1 kHz', '5 Hz .. 2 kHz', '10 Hz .. 4.5 kHz'),
    peak: fc.constantFrom('', 'peak: 40 g', 'peak: 120 g', 'peak: 4 g'),
    step: fc.constantFrom('', 'then: [{ decimate: 2 }]', 'then: [{ decimate: 4, filter: tidy }]'),
    slip: fc.constantFrom('', 'flatnes: 1 dB', 'filter: crad', 'headroom: 3', 'digitizer: fornt-end'),
    follows: fc.constantFrom('', '', 'follows: shock-peaks', 'follows: [impact-class-1000, spectrum-work-80-db]'),
    noise: fc.constantFrom('', '', 'sources', 'converter'),
    style: fc.constantFrom('block', 'flow', 'defaults', 'alias'),
    spectrum: fc.constantFrom(
      '',
      '',
      'spectrum: { lines: 100, separate: 40 Hz }',
      "spectrum: { record: '0.01 s', averages: 300, overlap: 50 % }",
      'spectrum: { resolution: 50Hz, window: rectangle, averages: 4 }',
    ),
    run: fc.constantFrom(
      '',
      'run: { duration: 1 s, disk: 100 kB }',
      'run: { duration: 10 min, records: 3, record: 200 ms, link: 1 kB/s }',
    ),
    scan: fc.constantFrom(
      '',
      '',
      ', sampling: scanned',
      ', sampling: scanned, max-rate: 30 kHz',
      ', sampling: scanned, settling: 6 us',
      ', sampling: scanned, scan-interval: 40 us, settling: 6 us',
    ),
    group: fc.constantFrom('', '', 'group: pair'),
    accepted: fc.constantFrom(
      '',
      '',
      'accept: []',
      'accept: [{ finding: band-droop, reason: corrected afterwards }]',
      'accept:\n  # known\n  - finding: fold-in-band\n    on: "*-0*"\n    reason: known\n',
      'accept:\n- { finding: filter-short, on: ch-1, reason: "" }',
    ),
    many: fc.constantFrom('', '', '', '-{1..4}'),
    lineEnd: fc.constantFrom('\n', '\n', '\r\n'),
  })
  .map((draft) => {
    const ripple = draft.response === 'chebyshev' ? ', ripple: 0.5 dB' : '';
    const converter = draft.noise === 'converter' ? 'bits: 10, noise: 2 mV, jitter: 1 us' : 'bits: 24';
    const sensorNoise = draft.noise === 'sources' ? ', noise: 30 ug/rtHz' : '';
    const hiss = draft.noise === 'sources' ? ['  hiss: { noise: 300 uV/rtHz, spans: 3 kHz .. 40 kHz }'] : [];
    const head = [
      '# faulty on purpose',
      'rig: Faulty',
      'clocks:',
      '  chassis: { frequency: 13.1072 MHz, divide: 1..512 }',
      'digitizers:',
      `  front-end: { clock: chassis, prescale: 256, ${converter}, full-scale: ±10 V, ranges: [±10 V, ±1 V]${draft.scan} }`,
      'filters:',
      `  card: { response: ${draft.response}, order: ${draft.order}${ripple}, cutoff: ${draft.cutoff} }   # the card's own`,
      '  tidy: { response: kaiser, pass: 0.1 fs, stop: 0.15 fs, stopband: 70 dB }',
      'sensors:',
      `  stud: { measures: acceleration, sensitivity: 100 mV/g, resonance: 30 kHz, range: 100 g${sensorNoise} }`,
      'sources:',
      '  blade: { order: 9, speed: 600..3000 rpm, harmonics: 3, level: 1 g, falls: 6 dB/oct, wanted: true }',
      `  inverter: { carrier: ${draft.carrier}, modulation: 50 Hz${draft.level} }`,
      ...hiss,
      ...(draft.group === '' ? [] : ['groups:', '  pair: { within: 2 deg, up-to: 100 Hz }']),
    ];
    const keys = (rate: string): string[] =>
      [
        'sensor: stud',
        'digitizer: front-end',
        `rate: ${rate}`,
        'filter: card',
        `band: ${draft.band}`,
        draft.peak,
        draft.noise === 'converter' ? 'resolve: 50 mg' : '',
        draft.step,
        draft.follows,
        draft.spectrum,
        draft.group,
      ].filter((key) => key !== '');
    const channels = draft.rates.flatMap((rate, index): string[] => {
      const name = `ch-${index}${draft.many}`;
      const slip = index === 0 && draft.slip !== '' ? draft.slip : undefined;
      const all = keys(rate).filter((key) => slip === undefined || key.split(':')[0] !== slip.split(':')[0]);
      if (slip !== undefined) all.push(slip);
      switch (draft.style) {
        case 'flow':
          return [`  ${name}: { ${all.join(', ')} }`];
        case 'alias':
          return index === 0 ? [`  ${name}: &first`, ...all.map((key) => `    ${key}`)] : [`  ${name}: *first`];
        case 'defaults':
          return [
            `  ${name}:   # position ${index}`,
            ...all.filter((key) => !/^(rate|filter: card|spectrum)/.test(key)).map((key) => `    ${key}`),
          ];
        default:
          return [`  ${name}:`, ...all.map((key) => `    ${key}`), `    # end of ${index}`];
      }
    });
    const defaults =
      draft.style === 'defaults'
        ? ['defaults:', `  rate: ${draft.rates[0]}`, '  filter: card', `  ${draft.spectrum}`]
        : [];
    const accepted = draft.accepted.split('\n');
    return [...head, draft.run, ...accepted, ...defaults, 'channels:', ...channels, ''].join(draft.lineEnd);
  });
