import { arrivalsOf } from '../chain/arrivals.ts';
import { type BandResponse, bandResponseOf } from '../chain/band-response.ts';
import { chainOf } from '../chain/chain.ts';
import { type ImageArrival, imageArrivalsOf } from '../chain/images.ts';
import type { Arrival, Chain } from '../chain/model.ts';
import { type NoiseBudget, noiseBudgetOf } from '../chain/noise.ts';
import { type ChannelSpectrum, spectrumOf } from '../chain/spectrum.ts';
import { type UndeclaredFold, undeclaredFolds } from '../chain/undeclared.ts';
import type { Channel } from '../rig/model.ts';
import type { ChannelView, InputRange, Shortfall } from './check.ts';
import { inputRangeOf } from './input-range.ts';
import { shortfallOf } from './shortfall.ts';

/** What the checks see of a channel; `undefined` for one that is not complete enough to have a chain. */
export function viewOf(channel: Channel): ChannelView | undefined {
  const chain = chainOf(channel);
  return chain && new View(channel, chain);
}

/** Each part is worked out when a check first asks for it: a search that judges by one check pays for no more. */
class View implements ChannelView {
  readonly channel: Channel;
  readonly chain: Chain;
  #arrivals: readonly Arrival[] | undefined;
  #undeclared: readonly (UndeclaredFold | undefined)[] | undefined;
  #images: readonly ImageArrival[] | undefined;
  #bandResponse: BandResponse | undefined;
  #shortfall: { readonly of: Shortfall | undefined } | undefined;
  #spectrum: { readonly of: ChannelSpectrum | undefined } | undefined;
  #input: { readonly of: InputRange | undefined } | undefined;
  #noise: { readonly of: NoiseBudget | undefined } | undefined;

  constructor(channel: Channel, chain: Chain) {
    this.channel = channel;
    this.chain = chain;
  }

  get arrivals(): readonly Arrival[] {
    this.#arrivals ??= arrivalsOf(this.chain);
    return this.#arrivals;
  }

  get undeclared(): readonly (UndeclaredFold | undefined)[] {
    this.#undeclared ??= undeclaredFolds(this.chain);
    return this.#undeclared;
  }

  get images(): readonly ImageArrival[] {
    this.#images ??= imageArrivalsOf(this.chain);
    return this.#images;
  }

  get bandResponse(): BandResponse {
    this.#bandResponse ??= bandResponseOf(this.chain);
    return this.#bandResponse;
  }

  get shortfall(): Shortfall | undefined {
    this.#shortfall ??= { of: shortfallOf(this) };
    return this.#shortfall.of;
  }

  get input(): InputRange | undefined {
    this.#input ??= { of: inputRangeOf(this) };
    return this.#input.of;
  }

  get spectrum(): ChannelSpectrum | undefined {
    if (!this.channel.spectrum) return undefined;
    this.#spectrum ??= { of: spectrumOf(this.chain) };
    return this.#spectrum.of;
  }

  get noise(): NoiseBudget | undefined {
    this.#noise ??= { of: noiseBudgetOf(this.chain) };
    return this.#noise.of;
  }
}
