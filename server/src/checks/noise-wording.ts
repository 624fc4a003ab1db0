import type { Chain } from '../chain/model.ts';
import type { NoiseContribution } from '../chain/noise.ts';
import type { NoiseOrigin } from '../chain/noise-inputs.ts';
import { decibels } from '../signal/decibel.ts';
import { peakOfRms } from '../signal/levels.ts';
import { levelText } from './wording.ts';

/** What noise comes from, in words; of a source the name alone. */
export function originText(origin: NoiseOrigin): string {
  switch (origin.kind) {
    case 'source':
      return origin.source.name;
    case 'sensor':
      return "the sensor's own noise";
    case 'input':
      return "the noise of the digitizer's input";
    case 'steps':
      return "the noise of the converter's steps";
    case 'jitter':
      return 'the jitter of the sampling';
  }
}

/** The same in a sentence: a source's name is marked as one. */
export function originInSentence(origin: NoiseOrigin): string {
  return origin.kind === 'source' ? `\`${originText(origin)}\`` : originText(origin);
}

/** The rms of noise: in decibels as it is compared, in other units as an rms. */
export function noiseText(level: number, chain: Chain): string {
  const isInDecibels = chain.levelUnit === 'dbfs' || chain.levelUnit === 'relative';
  return isInDecibels ? levelText(level, chain) : `${levelText(level - decibels(peakOfRms(1)), chain)} rms`;
}

/** The contribution of which most is folded, or most is there at all. */
export function largestOf(
  contributions: readonly NoiseContribution[],
  levelOf: (contribution: NoiseContribution) => number,
): NoiseContribution | undefined {
  let largest: NoiseContribution | undefined;
  for (const one of contributions) if (!largest || levelOf(one) > levelOf(largest)) largest = one;
  return largest;
}
