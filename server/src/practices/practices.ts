import type { Authority, Practice, PublishedDocument, Requirement } from './model.ts';

/** Rate over band that leaves a filter of the usual steepness room to fall in. */
const USUAL_MARGIN: Requirement = { name: 'margin', kind: 'rate-over-band', least: 2.56 };

/**
 * Every practice that `follows` may name: the one place for their figures.
 *
 * A figure that is not sure is not here, and the row says what it leaves out: a wrong one is worse than none.
 */
export const PRACTICES: readonly Practice[] = [
  impactClass(60, 100),
  impactClass(180, 300),
  impactClass(600, 1000),
  impactClass(1000, 1650),
  supplyHarmonics(40, 'Harmonics that equipment puts on the supply, up to the 40th', {
    designation: 'IEC 61000-3-2',
    subject: 'limits for harmonic current emissions',
    edition: '2018',
  }),
  supplyHarmonics(50, 'Harmonics of the supply as part of its quality, up to the 50th', {
    designation: 'IEC 61000-4-30',
    subject: 'power quality measurement methods',
    edition: '2015',
  }),
  {
    name: 'machine-vibration',
    title: 'Severity of the vibration of machines, by the broad-band rms velocity',
    requirements: [{ name: 'band', kind: 'band', lowHz: 10, highHz: 1000 }],
    authority: fromMemory({
      designation: 'ISO 20816-1',
      subject: 'measurement and evaluation of machine vibration, general guidelines',
      edition: '2016',
    }),
    leftOut: [
      'the other ranges that parts of the series set for some machines, slow ones among them',
      'how far the response may depart from flat in the range',
      'how long has to be measured',
      'the limits of the evaluation zones',
    ],
  },
  humanVibration('whole-body-vibration', 'Vibration that the whole body is exposed to', 0.5, 80, [
    'the range for motion sickness, which lies lower',
  ]),
  humanVibration('hand-arm-vibration', 'Vibration that the hand and the arm are exposed to', 8, 1000, []),
  {
    name: 'spectrum-work',
    title: 'Spectra without folds up to the top of the band, with filters of the usual steepness',
    requirements: [USUAL_MARGIN],
    authority: {
      kind: 'common-practice',
      reason:
        'at 2.56 times the top of the band a filter has 0.56 of the band to fall in, and 400 lines come from 1024 samples',
    },
    leftOut: ['what the filter has to take off, which is for the test to say'],
  },
  {
    name: 'spectrum-work-80-db',
    title: 'Spectra in which whatever folds into the band is at least 80 dB down',
    requirements: [USUAL_MARGIN, { name: 'fold', kind: 'fold', leastDb: 80 }],
    authority: { kind: 'common-practice', reason: 'the usual margin, and the 80 dB that its name says' },
    leftOut: ['the noise and the distortion of the converter'],
  },
  {
    name: 'shock-peaks',
    title: 'Peaks that are read from the samples themselves, not from a curve through them',
    requirements: [{ name: 'margin', kind: 'rate-over-band', least: 10 }],
    authority: {
      kind: 'common-practice',
      reason:
        'of ten samples in a period the highest is no more than half a sample from the peak of a sinusoid, so it is at most 1 - cos(180 deg / 10) = 4.9 % too low',
    },
    leftOut: ['the response of the filter, whose ringing adds to peaks'],
  },
];

/** The names, in the order of the table. */
export const PRACTICE_NAMES: readonly string[] = PRACTICES.map(({ name }) => name);

const BY_NAME: ReadonlyMap<string, Practice> = new Map(PRACTICES.map((practice) => [practice.name, practice]));

/** The practice of that name, if there is one. */
export function practiceNamed(name: string): Practice | undefined {
  return BY_NAME.get(name);
}

/** A channel of a vehicle impact test: 1 dB down at most at the frequency of its class, 4 dB at its cut-off. */
function impactClass(classHz: number, cutoffHz: number): Practice {
  return {
    name: `impact-class-${classHz}`,
    title: `A measurement channel of a vehicle impact test, of channel frequency class ${classHz}`,
    requirements: [
      { name: 'rate', kind: 'rate', leastHz: 10 * classHz },
      { name: 'band', kind: 'band', highHz: classHz },
      { name: 'flat', kind: 'pass', lowHz: 0.1, highHz: classHz, mostDb: 1 },
      { name: 'cut-off', kind: 'pass', lowHz: classHz, highHz: cutoffHz, mostDb: 4 },
    ],
    authority: fromMemory(
      {
        designation: 'SAE J211-1',
        subject: 'instrumentation for impact test, electronic instrumentation',
        edition: '2014',
      },
      { designation: 'ISO 6487', subject: 'measurement techniques in impact tests, instrumentation', edition: '2015' },
    ),
    leftOut: [
      'the narrower limits that hold well below the frequency of the class, and the upper limits',
      'how steeply the response has to fall beyond the cut-off, and what has to be taken off at half the rate',
      'the limits on phase, on delay and on the class of the amplitude',
      'the transducer, which belongs to the channel but is not among its filters here',
    ],
  };
}

/** Both frequencies of the supply come to 200 ms. */
function supplyHarmonics(order: number, title: string, document: PublishedDocument): Practice {
  return {
    name: `supply-harmonics-${order}`,
    title,
    requirements: [
      { name: 'order', kind: 'order', order },
      {
        name: 'record',
        kind: 'record',
        of: [
          { supplyHz: 50, cycles: 10 },
          { supplyHz: 60, cycles: 12 },
        ],
      },
      { name: 'window', kind: 'window', window: 'rectangle' },
    ],
    authority: fromMemory(
      {
        designation: 'IEC 61000-4-7',
        subject: 'harmonics and interharmonics measurements and instrumentation',
        edition: '2002 with amendment 1 of 2008',
      },
      document,
    ),
    leftOut: [
      'what the filter ahead of the converter has to take off',
      'how closely the record has to keep to the period of the supply',
      'how lines are grouped, smoothed and aggregated',
      'the limits on accuracy',
    ],
  };
}

function humanVibration(
  name: string,
  title: string,
  lowHz: number,
  highHz: number,
  alsoLeftOut: readonly string[],
): Practice {
  return {
    name,
    title,
    requirements: [{ name: 'band', kind: 'band', lowHz, highHz }],
    authority: fromMemory({
      designation: 'ISO 8041-1',
      subject: 'human response to vibration, measuring instrumentation',
      edition: '2017',
    }),
    leftOut: [
      'the weightings, the filters that limit the band, and their tolerances: the range here is the nominal one',
      'how long has to be measured',
      ...alsoLeftOut,
    ],
  };
}

function fromMemory(...documents: readonly PublishedDocument[]): Authority {
  return { kind: 'published', documents, read: 'from memory' };
}
