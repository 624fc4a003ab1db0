import { hasImages, imageArrivalsOf } from '../chain/images.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { levelKey } from './level-key.ts';
import { noiseJson } from './noise-json.ts';
import { reported } from './number.ts';

/** The alias map of one channel as data. */
export function mapJson(file: string, chain: Chain, arrivals: readonly Arrival[], findings: readonly string[]): string {
  const map = {
    version: 1,
    file,
    channel: chain.channel.name,
    stages: chain.stages.map(({ rateHz, nyquistHz }) => ({ rateHz: reported(rateHz), nyquistHz: reported(nyquistHz) })),
    bandHz: [reported(chain.bandLowHz), reported(chain.bandHighHz)],
    margin: reported(chain.margin),
    ...levelKey('foldLimit', chain, chain.foldLimit),
    arrivals: arrivals.map((arrival) => arrivalJson(arrival, chain)),
    ...imagesKey(chain),
    ...noiseJson(chain),
    findings,
  };
  return `${JSON.stringify(map, undefined, 2)}\n`;
}

/** What uneven sampling puts into the band over the limit; nothing is said of images where all samples are kept. */
function imagesKey(chain: Chain): object {
  if (!hasImages(chain.channel)) return {};
  return {
    images: imageArrivalsOf(chain).map((image) => ({
      source: image.source.name,
      component: image.component,
      trueHz: [reported(image.trueLowHz), reported(image.trueHighHz)],
      recordedHz: [reported(image.recordedLowHz), reported(image.recordedHighHz)],
      shiftHz: reported(image.shiftHz),
      ...levelKey('level', chain, image.level),
    })),
  };
}

function arrivalJson(arrival: Arrival, chain: Chain): object {
  return {
    source: arrival.source.name,
    component: arrival.component,
    trueHz: [reported(arrival.trueLowHz), reported(arrival.trueHighHz)],
    recordedHz: [reported(arrival.recordedLowHz), reported(arrival.recordedHighHz)],
    ...levelKey('level', chain, arrival.level),
    attenuationDb: reported(arrival.attenuationDb),
    folded: arrival.folded,
    foldsAtStage: arrival.foldsAtStage,
    mirrored: arrival.mirrored,
    inBand: arrival.inBand,
    overLimit: arrival.overLimit,
  };
}
