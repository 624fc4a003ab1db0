import type { ChannelSpectrum } from '../chain/spectrum.ts';
import { formatHz } from '../quantity/write.ts';
import { leastSeparationHz, tellsApart } from '../signal/spectrum-plan.ts';
import { type ChannelView, type Check, SAYS_NOTHING, type Said } from './check.ts';
import { standingOn } from './standing.ts';
import { closestWanted, type WantedLine, type WantedPair } from './wanted-lines.ts';

export const linesTooCoarse: Check<'channel'> = {
  name: 'lines-too-coarse',
  kind: 'channel',
  severity: 'warning',
  finds: 'Lines of `wanted` sources, or two tones `separate` apart, will not be told from one another in the spectrum.',
  why: 'A record of some length shows a tone as a lobe that is a few lines wide, by the window. Two tones nearer to one another than the width of that lobe 6 dB below its top stand in one lobe: their levels and their number can no longer be read. Only a longer record, or a narrower window, tells them apart. Of what turns with a shaft the orders are compared, at the lowest speed at which both are in the band.',
  shows: `rig: Gearbox
sources:
  mesh: { carrier: 620 Hz, modulation: 20 Hz, wanted: true }
channels:
  casing:
    rate: 5.12 kHz
    band: 10 Hz .. 2 kHz
    undeclared: -80 dBFS
    # Lines 12.8 Hz apart: with a Hann window tones have to be 25.6 Hz apart.
    spectrum: { record: 78.125 ms, window: hann }
`,
  clean: `rig: Gearbox
sources:
  mesh: { carrier: 620 Hz, modulation: 20 Hz, wanted: true }
channels:
  casing:
    rate: 5.12 kHz
    band: 10 Hz .. 2 kHz
    undeclared: -80 dBFS
    # Lines 10 Hz apart, and a Hann window's lobe is 2.00 of them wide.
    spectrum: { record: 100 ms, window: hann, separate: 20.01 Hz }
`,
  sources: [
    'Harris, On the use of windows for harmonic analysis with the discrete Fourier transform, Proc. IEEE 1978: two tones of equal level are told apart from the 6 dB bandwidth of the window on.',
    'Order x speed: arithmetic.',
  ],
  run(view) {
    const { spectrum } = view;
    return spectrum ? tooCoarse(view, spectrum) : SAYS_NOTHING;
  },
};

function tooCoarse(view: ChannelView, spectrum: ChannelSpectrum): readonly Said[] {
  const { separateHz } = spectrum.spectrum;
  const pair = closestWanted(view);
  const said: Said[] = [];
  if (pair && !isToldApart(spectrum, pair.distanceHz)) said.push(saidOfPair(view, spectrum, pair));
  if (separateHz && !isToldApart(spectrum, separateHz.value)) {
    const coarse = saidOf(
      view,
      spectrum,
      separateHz.value,
      `Two tones ${formatHz(separateHz.value)} apart, as \`separate\` wants them told from one another, will run together`,
    );
    const stands = { place: separateHz.place, message: '`separate` stands here.' };
    said.push({ ...coarse, about: 'separate', related: [...(coarse.related ?? []), stands] });
  }
  return said;
}

function isToldApart({ settings, record }: ChannelSpectrum, distanceHz: number): boolean {
  return tellsApart(settings.window, record.resolutionHz, distanceHz);
}

function saidOfPair(view: ChannelView, spectrum: ChannelSpectrum, pair: WantedPair): Said {
  const { lower, upper, distanceHz, sweeps } = pair;
  const as = sweeps ? `, which come as near as ${formatHz(distanceHz)}` : `, ${formatHz(distanceHz)} apart`;
  const said = saidOf(view, spectrum, distanceHz, `${lineText(lower)} and ${lineText(upper)}${as}, will run together`);
  const sources = lower.source === upper.source ? [lower.source] : [lower.source, upper.source];
  const declared = sources.map(({ name, place }) => ({ place, message: `\`${name}\` is declared here.` }));
  return { ...said, related: [...(said.related ?? []), ...declared] };
}

function lineText({ source, component, hz }: WantedLine): string {
  return `\`${source.name}\` ${component} at ${formatHz(hz)}`;
}

function saidOf(view: ChannelView, spectrum: ChannelSpectrum, distanceHz: number, what: string): Said {
  const { settings, record } = spectrum;
  const leastHz = leastSeparationHz(settings.window, record.resolutionHz);
  const standing = standingOn(view.channel, spectrum.spectrum.length);
  return {
    message: `${what}: with lines ${formatHz(record.resolutionHz)} apart and the window \`${settings.window}\`, tones have to be ${formatHz(leastHz)} apart to be told from one another.`,
    place: standing.place,
    related: standing.related,
    figures: { distanceHz, leastSeparationHz: leastHz, resolutionHz: record.resolutionHz },
    excess: leastHz / distanceHz,
  };
}
