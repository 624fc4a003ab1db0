import { tableUnit } from '../quantity/unit.ts';
import { formatHz, writeRangeLike } from '../quantity/write.ts';
import type { Channel, FrequencyRange } from '../rig/model.ts';
import { channelValue } from './channel-edit.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import type { Search } from './search.ts';
import { cured, furthestCured } from './search.ts';

/** Digits of a band's new end: as many as somebody would write. */
const BAND_DIGITS = 3;

/** A band is not narrowed to less than this part of what it was. */
const LEAST_PART = 0.01;

export const narrowBand: RemedyDefinition = {
  name: 'narrow-band',
  kind: 'requirement',
  finds: 'The widest band inside the present one at which the finding is gone.',
  why: 'What folds beside the band spoils nothing. It is a remedy only if the test can do without the part of the band that is given up.',
  answers: [
    'band-over-nyquist',
    'bandpass-straddles',
    'thin-margin',
    'fold-in-band',
    'fold-unlevelled',
    'filter-short',
    'no-filter',
    'step-without-filter',
    'on-nyquist',
    'pattern-image',
    'interleave-image',
    'band-droop',
    'resonance-in-band',
    'noise-folds',
    'step-too-coarse',
    'jitter-limited',
  ],
  search: searchNarrower,
};

function searchNarrower(search: Search): readonly Proposal[] {
  const { channel } = search;
  const band = channel?.band?.value;
  if (!channel || !band) return [];
  const bands = [lowerTop(search, channel, band), higherBottom(search, channel, band)].filter(
    (one) => one !== undefined,
  );
  const widest = bands.sort((a, b) => b.highHz - b.lowHz - (a.highHz - a.lowHz))[0];
  if (!widest) return [];
  const text = writeRangeLike(widest.lowHz, widest.highHz, channel.band?.written, tableUnit('Hz'));
  const edited = channelValue(search, 'band', (other) => other.band, text);
  if (!edited) return [];
  return [
    {
      does: `use the band only ${widest.highHz < band.highHz ? `up to ${formatHz(widest.highHz)}` : `from ${formatHz(widest.lowHz)}`}`,
      outcome: `${Math.round(100 * part(widest, band))} % of it is left`,
      ...edited,
    },
  ];
}

function lowerTop(search: Search, channel: Channel, band: FrequencyRange): FrequencyRange | undefined {
  const withTop = (highHz: number): Channel => banded(channel, { lowHz: band.lowHz, highHz });
  const least = band.lowHz + LEAST_PART * (band.highHz - band.lowHz);
  if (!cured(search, withTop(least))) return undefined;
  const top = rounded(furthestCured(search, least, band.highHz, withTop), Math.floor);
  return top > band.lowHz && cured(search, withTop(top)) ? { lowHz: band.lowHz, highHz: top } : undefined;
}

function higherBottom(search: Search, channel: Channel, band: FrequencyRange): FrequencyRange | undefined {
  const withBottom = (lowHz: number): Channel => banded(channel, { lowHz, highHz: band.highHz });
  const most = band.highHz - LEAST_PART * (band.highHz - band.lowHz);
  if (!cured(search, withBottom(most))) return undefined;
  const bottom = rounded(furthestCured(search, most, band.lowHz, withBottom), Math.ceil);
  return bottom < band.highHz && cured(search, withBottom(bottom)) ? { lowHz: bottom, highHz: band.highHz } : undefined;
}

function banded(channel: Channel, value: FrequencyRange): Channel {
  if (!channel.band) return channel;
  const { written: _, ...given } = channel.band;
  return { ...channel, band: { ...given, value } };
}

function rounded(hz: number, round: (value: number) => number): number {
  if (!(hz > 0)) return 0;
  const unit = 10 ** (Math.floor(Math.log10(hz)) + 1 - BAND_DIGITS);
  return Number((round(hz / unit) * unit).toPrecision(BAND_DIGITS + 1));
}

function part(band: FrequencyRange, of: FrequencyRange): number {
  return (band.highHz - band.lowHz) / (of.highHz - of.lowHz);
}
