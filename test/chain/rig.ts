import { arrivalsOf } from '../../server/src/chain/arrivals.ts';
import { chainOf } from '../../server/src/chain/chain.ts';
import type { Arrival, Chain } from '../../server/src/chain/model.ts';
import { readChannel } from '../../server/src/rig/channel-reading.ts';
import { readEnvironment } from '../../server/src/rig/environment.ts';
import type { Channel } from '../../server/src/rig/model.ts';
import { readSnapshot } from '../../server/src/rig/snapshot.ts';

/** The channels of a rig file's text, as the real reader reads them; a slip in the text is an error of the test. */
export function channelsOf(text: string): readonly Channel[] {
  const environment = readEnvironment(readSnapshot(text), []);
  const problems = environment.problems.map(({ problem }) => problem.message);
  const channels = environment.channelEntries.map((entry) => {
    const reading = readChannel(entry, environment);
    problems.push(...reading.problems.map(({ problem }) => problem.message));
    return reading.channel;
  });
  if (problems.length > 0) throw new Error(problems.join('\n'));
  return channels;
}

/** The chain of the first channel of a rig file's text. */
export function chainOfText(text: string): Chain {
  const chain = chainOf(channelsOf(text)[0]!);
  if (!chain) throw new Error('The channel is not complete.');
  return chain;
}

/** What arrives on the first channel of a rig file's text. */
export function arrivalsOfText(text: string): readonly Arrival[] {
  return arrivalsOf(chainOfText(text));
}

/** The arrival of one component. */
export function arrival(arrivals: readonly Arrival[], source: string, component: string): Arrival {
  const found = arrivals.find((one) => one.source.name === source && one.component === component);
  if (!found) throw new Error(`Nothing arrives of ${source}, ${component}.`);
  return found;
}
