import { formatHz } from '../quantity/write.ts';
import { WINDOW_CHOICE_NAMES, type WindowChoice } from '../rig/window-choices.ts';
import { leastSeparationHz } from '../signal/spectrum-plan.ts';
import { windowFigures } from '../signal/window-figures.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import { inPlaceOf, spectrumNow, spectrumValue, withSpectrum } from './spectrum-edit.ts';

export const anotherWindow: RemedyDefinition = {
  name: 'another-window',
  kind: 'setting',
  finds:
    'Where lines run together, the window of the lowest side lobes that tells them apart; where side lobes cover too much, the narrowest that does not.',
  why: 'A window trades the width of a line against the height of its side lobes. It costs no time and no data.',
  answers: ['lines-too-coarse', 'window-leaks'],
  search: searchWindow,
};

function searchWindow(search: Search): readonly Proposal[] {
  const { channel, context } = search;
  const today = spectrumNow(search);
  if (!channel || !today) return [];
  const others = WINDOW_CHOICE_NAMES.filter((name) => name !== today.settings.window);
  const { window } = today.spectrum;
  const found = firstCured(search, inOrder(others, context.finding.check), (name) =>
    withSpectrum(channel, { window: inPlaceOf(window, name, channel) }),
  );
  const edited = found && spectrumValue(search, 'window', found.value);
  if (!found || !edited) return [];
  const apart = formatHz(leastSeparationHz(found.value, today.record.resolutionHz), 4);
  const lobes = windowFigures(found.value).highestSideLobeDb.toFixed(0);
  return [
    {
      does: `Use the window \`${found.value}\``,
      outcome: `tones ${apart} apart are told apart, side lobes are at ${lobes} dB and below`,
      ...edited,
    },
  ];
}

function inOrder(names: readonly WindowChoice[], check: string): readonly WindowChoice[] {
  const cost = (name: WindowChoice): number => {
    const { bandwidth6DbBins, highestSideLobeDb } = windowFigures(name);
    return check === 'window-leaks' ? bandwidth6DbBins : highestSideLobeDb;
  };
  return [...names].sort((one, other) => cost(one) - cost(other));
}
