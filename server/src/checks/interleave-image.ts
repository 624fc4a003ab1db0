import type { Chain } from '../chain/model.ts';
import { foldHz } from '../signal/folding.ts';
import { offsetLines } from '../signal/interleave.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { saidOfImages } from './images-said.ts';
import { type Standing, standingOn } from './standing.ts';
import { differenceText, hzText, levelFigures, levelText } from './wording.ts';

export const interleaveImage: Check<'channel'> = {
  name: 'interleave-image',
  kind: 'channel',
  severity: 'warning',
  finds:
    'Converters that take turns differ so much that an image of a source, of the band, or an offset line lands in the band above the fold limit.',
  why: 'Converters that take turns never have quite the same gain, offset and instant. What differs repeats with every turn, so everything in the record appears again beside itself, at every multiple of the rate of one converter, and the offsets make lines of their own there. How the error is shared among the images depends on the order of the converters; each is judged as if it had all of it.',
  shows: `rig: Bench
digitizers:
  front-end: { bits: 14, full-scale: ±1 V, interleave: { converters: 2, gain-mismatch: 0.2 % } }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 40 MHz }
channels:
  probe:
    digitizer: front-end
    rate: 100 MHz
    filter: card
    band: 11 MHz .. 40 MHz
    # 0.2 % is -53.98 dB of full scale.
    fold-limit: -54 dBFS
`,
  clean: `rig: Bench
digitizers:
  front-end: { bits: 14, full-scale: ±1 V, interleave: { converters: 2, gain-mismatch: 0.2 % } }
filters:
  card: { response: elliptic, order: 8, ripple: 0.1 dB, stopband: 80 dB, pass-edge: 40 MHz }
channels:
  probe:
    digitizer: front-end
    rate: 100 MHz
    filter: card
    band: 11 MHz .. 40 MHz
    fold-limit: -53.9 dBFS
`,
  sources: [
    'Black and Hodges, Time interleaved converter arrays, IEEE JSSC 1980.',
    'Vogel, The impact of combined channel mismatch effects in time-interleaved ADCs, IEEE Trans. Instrumentation and Measurement 2005.',
  ],
  run(view) {
    const { channel, chain } = view;
    const interleave = channel.digitizer?.interleave;
    if (!interleave) return SAYS_NOTHING;
    const because = `${interleave.value.converters} converters take turns and differ`;
    const standing = standingOn(channel, interleave);
    const offset = offsetLine(chain, view, standing);
    const images = saidOfImages(view, 'interleave', because, standing);
    return offset ? [...images, offset] : images;
  },
};

/** The lines that unlike offsets make, at multiples of the rate of one converter. */
function offsetLine(chain: Chain, { channel }: ChannelView, standing: Standing): Said | undefined {
  const mismatch = channel.digitizer?.interleave?.value;
  if (!mismatch || chain.levelUnit !== 'dbfs') return undefined;
  const lines = offsetLines(chain.ratesHz[0]!, mismatch);
  if (!lines) return undefined;
  const level = lines.togetherDbfs;
  const excess = level - chain.foldLimit;
  if (!(excess > 0)) return undefined;
  const { lowHz, highHz } = chain.recordedBand;
  for (const lineHz of lines.recordedHz) {
    const recordedHz = chain.ratesHz.reduce(foldHz, lineHz);
    if (recordedHz < lowHz || recordedHz > highHz) continue;
    return {
      about: 'offset',
      message: `A line will stand at ${hzText(recordedHz, recordedHz)}, inside the band, because ${mismatch.converters} converters take turns and their offsets differ. It may be ${levelText(level, chain)}, ${differenceText(excess)} over the fold limit of ${levelText(chain.foldLimit, chain)}.`,
      place: standing.place,
      related: standing.related,
      figures: { recordedHz, ...levelFigures(level, chain) },
      excess,
    };
  }
  return undefined;
}
