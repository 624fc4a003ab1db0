import { spectrumOf } from '../chain/spectrum.ts';
import type { ChannelResult } from '../checks/channel-result.ts';
import { tableUnit } from '../quantity/unit.ts';
import { formatHz, formatQuantity, writeLike } from '../quantity/write.ts';
import type { Channel, Given } from '../rig/model.ts';
import type { RecordLength } from '../signal/spectrum-plan.ts';
import type { Proposal, RemedyDefinition } from './definition.ts';
import { formatNumber } from './describe.ts';
import type { Search } from './search.ts';
import { firstCured } from './search.ts';
import { inPlaceOf, spectrumNow, spectrumValue, withSpectrum } from './spectrum-edit.ts';

/** Doublings: what was a power of two of samples stays one. */
const TIMES = Array.from({ length: 10 }, (_, doublings) => 2 ** (doublings + 1));

export const longerRecord: RemedyDefinition = {
  name: 'longer-record',
  kind: 'setting',
  finds: 'The least doubling of the record, its lines or their resolution, at which the finding is gone.',
  why: 'Lines are as far apart as one over the record: in a longer one they stand closer, and what lies side by side is told apart. It takes time in proportion, and a tone has to stand still for that long.',
  answers: ['lines-too-coarse', 'window-leaks', 'fold-hides', 'on-nyquist'],
  search: searchLonger,
};

function searchLonger(search: Search): readonly Proposal[] {
  const { channel } = search;
  const today = spectrumNow(search);
  if (!channel || !today) return [];
  const { length } = today.spectrum;
  const found = firstCured(search, TIMES, (times) => recordedFor(channel, length, times));
  if (!found) return [];
  const { key, text, does } = written(length, found.value);
  const edited = spectrumValue(search, key, text);
  return edited ? [{ does, outcome: outcomeOf(found.after, found.value), ...edited }] : [];
}

function recordedFor(channel: Channel, length: Given<RecordLength>, times: number): Channel | undefined {
  return withSpectrum(channel, { length: inPlaceOf(length, longer(length.value, times), channel) });
}

function longer(length: RecordLength, times: number): RecordLength {
  switch (length.by) {
    case 'lines':
      return { by: 'lines', lines: length.lines * times };
    case 'resolution':
      return { by: 'resolution', resolutionHz: length.resolutionHz / times };
    case 'record':
      return { by: 'record', recordS: length.recordS * times };
  }
}

interface Written {
  readonly key: RecordLength['by'];
  readonly text: string;
  readonly does: string;
}

function written(given: Given<RecordLength>, times: number): Written {
  const before = given.value;
  const after = longer(before, times);
  switch (after.by) {
    case 'lines': {
      const text = String(after.lines);
      return { key: 'lines', text, does: `Use ${text} lines` };
    }
    case 'resolution': {
      const text = writeLike(after.resolutionHz, given.written, tableUnit('Hz'));
      return { key: 'resolution', text, does: `Use lines ${formatHz(after.resolutionHz)} apart` };
    }
    case 'record': {
      const text = writeLike(after.recordS, given.written, tableUnit('s'));
      return { key: 'record', text, does: `Use records of ${formatQuantity(after.recordS, 'time', 4)}` };
    }
  }
}

function outcomeOf({ chain }: ChannelResult, times: number): string {
  const after = chain && spectrumOf(chain);
  const cost = `(time x${formatNumber(times)})`;
  if (!after) return cost;
  const { recordS, resolutionHz } = after.record;
  return `${formatQuantity(recordS, 'time', 4)} long, lines ${formatHz(resolutionHz)} apart ${cost}`;
}
