import type { Chain } from '../chain/model.ts';
import { noiseBudgetOf } from '../chain/noise.ts';
import { levelKey } from './level-key.ts';

/** The noise in a channel's band, rms; without a key where the channel declares none. */
export function noiseJson(chain: Chain): { readonly noise?: object } {
  const noise = noiseBudgetOf(chain);
  if (!noise) return {};
  const contributions = noise.contributions.map(({ origin, nativeDb, foldedDb }) => ({
    of: origin.kind,
    ...(origin.kind === 'source' ? { source: origin.source.name } : {}),
    ...levelKey('native', chain, nativeDb),
    ...levelKey('folded', chain, foldedDb ?? Infinity),
    bounded: foldedDb !== undefined,
  }));
  return {
    noise: {
      ...levelKey('native', chain, noise.nativeDb),
      ...levelKey('folded', chain, noise.foldedDb),
      bounded: noise.contributions.every(({ foldedDb }) => foldedDb !== undefined),
      contributions,
    },
  };
}
