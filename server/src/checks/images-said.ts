import type { BandImage, ImageArrival } from '../chain/images.ts';
import { bandImagesOf } from '../chain/images.ts';
import type { Chain } from '../chain/model.ts';
import { formatHz } from '../quantity/write.ts';
import { decibels } from '../signal/decibel.ts';
import type { ChannelView, Said } from './check.ts';
import type { Standing } from './standing.ts';
import { differenceText, hzText, levelFigures, levelText } from './wording.ts';

/** What an image of the band itself is about. */
const THE_BAND = 'the band itself';

/** What images of one kind are said to do, each source by its highest, the band itself by its. */
export function saidOfImages(
  view: ChannelView,
  kind: ImageArrival['kind'],
  because: string,
  standing: Standing,
): readonly Said[] {
  const { chain, images } = view;
  const worst = new Map<string, ImageArrival>();
  for (const image of images) {
    if (image.kind !== kind) continue;
    const known = worst.get(image.source.name);
    if (!known || image.level > known.level) worst.set(image.source.name, image);
  }
  const said = [...worst.values()].map((image) => saidOfImage(image, chain, because, standing));
  const band = bandImagesOf(chain).find((image) => image.kind === kind);
  const own = band && saidOfBand(band, view, because, standing);
  return own ? [...said, own] : said;
}

function saidOfImage(image: ImageArrival, chain: Chain, because: string, standing: Standing): Said {
  const { source, component, level, levelKnown } = image;
  const excess = level - chain.foldLimit;
  const what = component === 'fundamental' ? 'it' : `its ${component}`;
  const assumed = levelKnown ? '' : ' Its level is not known here; full scale is assumed.';
  return {
    about: source.name,
    message: `\`${source.name}\` will also be recorded at ${hzText(image.recordedLowHz, image.recordedHighHz)}, inside the band, though ${what} is at ${hzText(image.trueLowHz, image.trueHighHz)}, because ${because}. There it is ${levelText(level, chain)}, ${differenceText(excess)} over the fold limit of ${levelText(chain.foldLimit, chain)}.${assumed}`,
    place: standing.place,
    related: [...standing.related, { place: source.place, message: `\`${source.name}\` is declared here.` }],
    figures: { atHz: image.atHz, shiftHz: image.shiftHz, ...levelFigures(level, chain) },
    excess,
  };
}

function saidOfBand(image: BandImage, view: ChannelView, because: string, standing: Standing): Said | undefined {
  const { chain } = view;
  const { known, levelDb } = bandLevelOf(view);
  const level = levelDb - image.lossDb;
  const excess = level - chain.foldLimit;
  if (!(excess > 0)) return undefined;
  const content = known ? `\`peak\`, ${levelText(levelDb, chain)}` : 'full scale, since `peak` is not given';
  return {
    about: THE_BAND,
    message: `What is in the band will be recorded ${formatHz(image.shiftHz)} beside itself too, inside the band at ${hzText(image.recordedLowHz, image.recordedHighHz)}, because ${because}. Of ${content}, ${levelText(level, chain)} is left there, ${differenceText(excess)} over the fold limit of ${levelText(chain.foldLimit, chain)}.`,
    place: standing.place,
    related: standing.related,
    figures: { shiftHz: image.shiftHz, lossDb: image.lossDb, ...levelFigures(level, chain) },
    excess,
  };
}

/** How high what is in the band may be: `peak` where that is known in volts, otherwise full scale. */
function bandLevelOf({ chain, input }: ChannelView): { readonly known: boolean; readonly levelDb: number } {
  const { fullScaleV, fullScaleDb } = chain.scale;
  if (!input || fullScaleV === undefined) return { known: false, levelDb: fullScaleDb };
  const peakV = Math.max(Math.abs(input.peak.lowV), Math.abs(input.peak.highV));
  return { known: true, levelDb: decibels(peakV / fullScaleV) };
}
