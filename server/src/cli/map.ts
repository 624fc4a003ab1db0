import { arrivalsOf } from '../chain/arrivals.ts';
import { aliasMapModel } from '../picture/alias-map-model.ts';
import { aliasMapSvg } from '../picture/alias-map-svg.ts';
import { mapJson } from '../report/map-json.ts';
import { mapText } from '../report/map-text.ts';
import { printable } from '../report/printable.ts';
import type { JudgedChannel } from '../workbench/evaluation.ts';
import { worstChannel } from '../workbench/worst-channel.ts';
import type { Command } from './command.ts';
import { deliver } from './command.ts';
import type { CommandIo, ExitCode } from './io.ts';
import { UsageError } from './io.ts';
import { newWorkbench, openRig } from './open-rig.ts';
import { choice, paintFor, parseOptions } from './options.ts';
import { channelOf } from './pick-channel.ts';

const OPTIONS = {
  format: { type: 'string' },
  theme: { type: 'string' },
  ascii: { type: 'boolean' },
  'stdin-filename': { type: 'string' },
} as const;

export const map: Command = {
  name: 'map',
  summary: 'draw the alias map of a channel',
  help: `Usage: ratewright map FILE [CHANNEL]

Draws where everything the sensor hears arrives in the record. Without a CHANNEL it
draws the one with the gravest findings. FILE may be - for standard input.

  --format text|svg|json    (text)
  --theme neutral|light|dark|high-contrast|high-contrast-light
                            colours of the SVG (neutral)
  --ascii                   draw the text map in ASCII alone
  --stdin-filename NAME     what to call standard input (stdin.rig.yaml)
  --color auto|always|never
  -o, --output FILE         write the map to FILE
`,
  run: runMap,
};

async function runMap(argv: readonly string[], io: CommandIo): Promise<ExitCode> {
  const options = parseOptions(argv, OPTIONS);
  const format = choice(options, 'format', ['text', 'svg', 'json'] as const, 'text');
  const theme = choice(
    options,
    'theme',
    ['neutral', 'light', 'dark', 'high-contrast', 'high-contrast-light'] as const,
    'neutral',
  );
  const paint = paintFor(options, io);
  const [path, name, ...rest] = options.words;
  if (path === undefined || rest.length > 0)
    throw new UsageError('map takes a FILE and, if it is not to choose, a CHANNEL');
  const rig = await openRig(newWorkbench(io), path, io, options.text('stdin-filename') ?? 'stdin.rig.yaml');
  if ('fault' in rig) {
    io.stderr(`ratewright: ${rig.path} ${rig.fault}\n`);
    return 2;
  }
  const judged = name === undefined ? worstChannel(rig.evaluation) : channelOf(rig.evaluation, name, rig.path, io);
  if (!judged) {
    if (name === undefined) io.stderr(`ratewright: ${rig.path} has no channel that can be drawn\n`);
    return 2;
  }
  const { chain } = judged.result;
  if (!chain) {
    io.stderr(`ratewright: ${printable(`${judged.result.channel.name} can't be drawn: ${whyNot(judged)}`)}\n`);
    return 2;
  }
  const arrivals = arrivalsOf(chain);
  switch (format) {
    case 'json':
      return deliver(mapJson(rig.path, chain, arrivals, findingNames(judged)), options, io);
    case 'svg':
      return deliver(`${aliasMapSvg(aliasMapModel(chain, arrivals), { theme })}\n`, options, io);
    case 'text':
      return deliver(
        mapText(chain, arrivals, {
          ascii: options.flag('ascii'),
          paint,
        }),
        options,
        io,
      );
  }
}

/** Each check's name once, in order of severity, then position. */
function findingNames(judged: JudgedChannel): readonly string[] {
  return [...new Set(judged.result.findings.map((finding) => finding.check))];
}

function whyNot(judged: JudgedChannel): string {
  const first = judged.result.findings[0];
  return first ? first.message : 'its rate or its band is missing';
}
