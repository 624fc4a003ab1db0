import { formatHz } from '../quantity/write.ts';
import { type RatePlace, type RateWindow, rateAmongWindows } from '../signal/bandpass.ts';
import { foldHz } from '../signal/folding.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOn, standingOnStage } from './standing.ts';
import { rateText, stageText } from './wording.ts';

export const bandpassStraddles: Check<'channel'> = {
  name: 'bandpass-straddles',
  kind: 'channel',
  severity: 'error',
  finds: 'A band that is folded on purpose crosses a multiple of half the rate.',
  why: 'A band may be sampled at far less than twice its top, as long as all of it folds in one piece. Where a multiple of half the rate lies inside it, its lower part is folded onto its upper part, and nothing tells them apart afterwards. The windows of rates that keep it whole get narrower the lower they are, and the tolerance of the clock narrows them further.',
  shows: `rig: Radio front end
digitizers:
  digitizer: { bits: 14, full-scale: ±1 V }
filters:
  image: { response: elliptic, order: 10, ripple: 0.1 dB, stopband: 80 dB, shape: band-pass, pass-edge: 19.9 MHz .. 25.1 MHz }
channels:
  first-if:
    digitizer: digitizer
    rate: 22 MHz
    sampling: bandpass
    filter: image
    band: 20 MHz .. 25 MHz
`,
  clean: `rig: Radio front end
digitizers:
  digitizer: { bits: 14, full-scale: ±1 V }
filters:
  image: { response: elliptic, order: 10, ripple: 0.1 dB, stopband: 80 dB, shape: band-pass, pass-edge: 19.9 MHz .. 25.1 MHz }
channels:
  first-if:
    digitizer: digitizer
    # From 16.67 MHz to 20 MHz the band is whole, and the right way up.
    rate: 18 MHz
    sampling: bandpass
    filter: image
    band: 20 MHz .. 25 MHz
`,
  sources: ['Vaughan, Scott and White, The theory of bandpass sampling, IEEE Trans. Signal Processing 1991.'],
  run: straddles,
};

function straddles({ chain, channel }: ChannelView): readonly Said[] {
  if (!chain.isBandpass) return SAYS_NOTHING;
  const { clockTolerance } = chain.path;
  let lowHz = chain.bandLowHz;
  let highHz = chain.bandHighHz;
  for (let index = 0; index < chain.stages.length; index++) {
    const { rateHz, nyquistHz } = chain.stages[index]!;
    const stage = index + 1;
    const place = rateAmongWindows({ lowHz, highHz, rateTolerance: clockTolerance }, rateHz);
    if (place.kind !== 'inside') {
      const multiple = Math.floor(lowHz / nyquistHz) + 1;
      const standing = standingOnStage(chain, stage);
      const where = stageText(chain, stage);
      const windows = stage === 1 ? windowsText(place) : '';
      return [
        {
          stage,
          message: `The band ${formatHz(lowHz)} .. ${formatHz(highHz)} will be folded onto itself, because ${multiple === 1 ? '' : `${multiple} times `}half of ${rateText(rateHz)}, ${formatHz(multiple * nyquistHz)}, lies inside it${clockTolerance > 0 ? ' or within the reach of the clock' : ''}${where === '' ? '' : `, ${where}`}.${windows}`,
          place: standing.place,
          related: [
            ...standing.related,
            { place: standingOn(channel, channel.band).place, message: 'The band is this.' },
          ],
          figures: { lowHz, highHz, rateHz, multipleHz: multiple * nyquistHz, stage },
          excess: Math.min(multiple * nyquistHz - lowHz, highHz - multiple * nyquistHz) / (highHz - lowHz),
        },
      ];
    }
    const first = foldHz(lowHz, rateHz);
    const second = foldHz(highHz, rateHz);
    lowHz = Math.min(first, second);
    highHz = Math.max(first, second);
  }
  return SAYS_NOTHING;
}

function windowsText(place: RatePlace): string {
  if (place.kind !== 'outside') return '';
  const told = [place.below, place.above].filter((window) => window !== undefined).map(windowText);
  return ` It stays whole at ${told.join(', or ')}.`;
}

function windowText({ lowRateHz, highRateHz, upright }: RateWindow): string {
  const rates =
    highRateHz === Infinity ? `${rateText(lowRateHz)} and more` : `${rateText(lowRateHz)} .. ${rateText(highRateHz)}`;
  return upright ? rates : `${rates} (upside down)`;
}
