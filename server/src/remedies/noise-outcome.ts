import type { Chain } from '../chain/model.ts';
import { noiseBudgetOf } from '../chain/noise.ts';
import { noiseText } from '../checks/noise-wording.ts';

/** What is left of the noise that a finding is about; `undefined` for one that is about no noise. */
export function noiseOutcome(check: string, chain: Chain): string | undefined {
  const noise = noiseBudgetOf(chain);
  if (!noise) return undefined;
  switch (check) {
    case 'noise-folds':
      return `${noiseText(noise.foldedDb, chain)} of noise fold into the band`;
    case 'step-too-coarse':
    case 'jitter-limited':
      return `the noise in the band is ${noiseText(noise.totalDb, chain)}`;
    default:
      return undefined;
  }
}
