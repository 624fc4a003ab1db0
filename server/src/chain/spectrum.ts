import type { Spectrum } from '../rig/model.ts';
import { USUAL_WINDOW } from '../rig/window-choices.ts';
import { recordAt, type SpectrumRecord, type SpectrumSettings } from '../signal/spectrum-plan.ts';
import type { Chain } from './model.ts';

/** What a channel's record is cut into for its spectrum. Nothing here has looked at the window's figures. */
export interface ChannelSpectrum {
  readonly spectrum: Spectrum;
  readonly settings: SpectrumSettings;
  readonly record: SpectrumRecord;
}

/** Everything that is left out filled in. */
export function spectrumSettings({ length, window, overlap, averages }: Spectrum): SpectrumSettings {
  return {
    length: length.value,
    window: window?.value ?? USUAL_WINDOW,
    overlap: overlap?.value ?? 0,
    averages: averages?.value ?? 1,
  };
}

/** The spectrum of a chain's last stage; `undefined` for a channel without one, or whose length makes no record. */
export function spectrumOf({ channel, ratesHz }: Pick<Chain, 'channel' | 'ratesHz'>): ChannelSpectrum | undefined {
  const spectrum = channel.spectrum?.value;
  if (!spectrum) return undefined;
  const settings = spectrumSettings(spectrum);
  const record = recordAt(settings.length, ratesHz[ratesHz.length - 1]!);
  return record && { spectrum, settings, record };
}
