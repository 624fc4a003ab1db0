import { describe, expect, it } from 'vitest';
import { mapJson } from '../../server/src/report/map-json.ts';
import { arrivalsOfText, chainOfText } from '../chain/rig.ts';

function noise(sources: string, channel = '', digitizer = 'bits: 16, full-scale: ±10 V') {
  const text = `rig: R
digitizers: { d: { ${digitizer} } }
sources: { ${sources} }
channels:
  c: { sensitivity: 1 V/g, digitizer: d, rate: 25.6 kHz, band: 0 Hz .. 10 kHz${channel} }
`;
  return (JSON.parse(mapJson('a', chainOfText(text), arrivalsOfText(text), [])) as { noise?: unknown }).noise;
}

describe('noise in the map as JSON', () => {
  it('is there only where it is declared', () => {
    expect(noise('hum: { frequency: 50 Hz, level: 1 V }')).toBeUndefined();
  });

  it('has each contribution, native and folded, and both sums', () => {
    // 10 uV/rtHz over 8 kHz, and over 8.4 kHz that fold: 20 log10(sqrt 2 rms / 10 V).
    const native = 20 * Math.log10((Math.SQRT2 * 10e-6 * Math.sqrt(8000)) / 10);
    const folded = 20 * Math.log10((Math.SQRT2 * 10e-6 * Math.sqrt(8400)) / 10);
    expect(noise('hiss: { noise: 10 uV/rtHz, spans: 2 .. 24 kHz }', '', 'full-scale: ±10 V')).toEqual({
      nativeDbfs: expect.closeTo(native, 2),
      foldedDbfs: expect.closeTo(folded, 2),
      bounded: true,
      contributions: [
        {
          of: 'source',
          source: 'hiss',
          nativeDbfs: expect.closeTo(native, 2),
          foldedDbfs: expect.closeTo(folded, 2),
          bounded: true,
        },
      ],
    });
  });

  it('has null for what is not there, and for what has no bound says so', () => {
    expect(noise('', ', noise: 1 ug/rtHz')).toMatchObject({
      foldedDbfs: null,
      bounded: false,
      contributions: [
        { of: 'sensor', foldedDbfs: null, bounded: false },
        { of: 'steps', foldedDbfs: null, bounded: true },
      ],
    });
  });
});
