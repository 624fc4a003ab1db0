import type { Source } from '../rig/model.ts';

/** The frequency of the supply, the highest where it is a range; `undefined` for what has no one frequency. */
export function supplyHzOf(mains: Source | undefined): number | undefined {
  return mains?.type === 'tone' ? mains.frequency.value.highHz : undefined;
}

/** Whether the supply may be one of a nominal frequency; one of which nothing is known may be any. */
export function supplyMatches(mains: Source | undefined, nominalHz: number): boolean {
  if (mains?.type !== 'tone') return true;
  const { lowHz, highHz } = mains.frequency.value;
  return lowHz * (1 - mains.tolerance) <= nominalHz && nominalHz <= highHz * (1 + mains.tolerance);
}
