import fc from 'fast-check';
import { expect, it } from 'vitest';
import { located, locatedFindings } from '../../server/src/workbench/findings.ts';
import type { FileContent, Workbench } from '../../server/src/workbench/workbench.ts';
import { editsOf, type Step, step } from '../tools/random-edits.ts';
import { runs } from '../tools/runs.ts';
import { strictWorkbench } from './describe-findings.ts';
import { FOLDER } from './used.ts';

const PATHS = ['a.rig.yaml', 'b.rig.yaml', 'c.rig.yaml', 'parts/d.rig.yaml', 'parts/e.rig.yaml'] as const;
/** As files of either folder may name them, some to no avail. */
const WRITTEN = [...PATHS, ...PATHS.map((path) => `../${path}`), './d.rig.yaml', 'e.rig.yaml', 'gone.rig.yaml'];

const oneOf = <T>(...items: readonly T[]): fc.Arbitrary<T> => fc.constantFrom(...items);
const NAME = oneOf('x', 'y', 'z');

/** A line of one named thing, which may name another. */
const THINGS: Readonly<Record<string, fc.Arbitrary<string>>> = {
  clocks: oneOf('{ frequency: 1 MHz }', '{ frequency: 3 MHz, divide: 1..64 }', '{ locked-to: y, frequency: 2 MHz }'),
  digitizers: fc
    .tuple(NAME, NAME)
    .map(([clock, filter]) => `{ clock: ${clock}, full-scale: ±10 V, bits: 16, filter: ${filter} }`),
  sensors: oneOf('{ measures: acceleration, sensitivity: 100 mV/g }', '{ measures: strain }', '{ measures: voltage }'),
  filters: oneOf('{ response: rc, order: 2, corner: 300 Hz }', '{ response: butterworth, order: 6, cutoff: 200 Hz }'),
  sources: oneOf('{ frequency: 950 Hz, level: 1 V }', '{ frequency: 50 Hz, level: 2 g }', '{ frequency: oops }'),
  groups: oneOf('{ within: 2 deg, up-to: 100 Hz }'),
};

const uses = fc.uniqueArray(oneOf(...WRITTEN), { maxLength: 3 }).map((paths) => `uses: [${paths.join(', ')}]\n`);

const section = (name: string, thing: fc.Arbitrary<string>): fc.Arbitrary<string> =>
  fc
    .uniqueArray(fc.tuple(NAME, thing), { maxLength: 2, selector: ([one]) => one })
    .map((things) =>
      things.length === 0 ? '' : `${name}:\n${things.map(([one, keys]) => `  ${one}: ${keys}\n`).join('')}`,
    );

const channel = fc
  .tuple(NAME, NAME, NAME, oneOf('all', 'none', '[x, y]', '{ z: 1 mV }'), NAME)
  .map(
    ([sensor, digitizer, filter, hears, group]) =>
      `{ sensor: ${sensor}, digitizer: ${digitizer}, filter: ${filter}, hears: ${hears}, group: ${group}, rate: 1 kHz, band: 1 Hz .. 100 Hz }`,
  );

const rigText: fc.Arbitrary<string> = fc
  .tuple(
    uses,
    oneOf('', 'mains: 50 Hz\n', 'defaults: { flatness: 1 dB }\n'),
    ...Object.entries(THINGS).map(([name, thing]) => section(name, thing)),
    section('channels', channel),
  )
  .map((parts) => `rig: R\n${parts.join('')}`);

const content: fc.Arbitrary<FileContent> = fc.oneof(
  { weight: 8, arbitrary: rigText.map((text) => ({ text })) },
  { weight: 1, arbitrary: oneOf<FileContent>('missing', 'too-large', { unread: 'is a folder' }) },
);

/** What happens to one file: on the disk, in an editor, or both. */
type Happening =
  | { readonly kind: 'disk'; readonly content: FileContent }
  | { readonly kind: 'open'; readonly text: string }
  | { readonly kind: 'close' }
  | { readonly kind: 'edit'; readonly step: Step }
  | { readonly kind: 'uses'; readonly line: string };

const happening: fc.Arbitrary<readonly [(typeof PATHS)[number], Happening]> = fc.tuple(
  oneOf(...PATHS),
  fc.oneof(
    fc.record({ kind: fc.constant('disk' as const), content }),
    fc.record({ kind: fc.constant('open' as const), text: rigText }),
    fc.record({ kind: fc.constant('close' as const) }),
    fc.record({ kind: fc.constant('edit' as const), step }),
    fc.record({ kind: fc.constant('uses' as const), line: uses }),
  ),
);

/** What a workbench ought to know, kept beside it. */
interface World {
  readonly disk: Map<string, FileContent>;
  readonly buffers: Map<string, string>;
}

function contentOf({ disk, buffers }: World, path: string): FileContent {
  const text = buffers.get(path);
  return text === undefined ? (disk.get(path) ?? 'missing') : { text };
}

function textOf(world: World, path: string): string | undefined {
  const found = contentOf(world, path);
  return typeof found === 'object' && 'text' in found ? found.text : undefined;
}

function tellWanted(workbench: Workbench, contentAt: (path: string) => FileContent): void {
  for (let wanted = workbench.filesWanted(); wanted.length > 0; wanted = workbench.filesWanted())
    for (const uri of wanted) workbench.setFile(uri, contentAt(uri.slice(FOLDER.length)));
}

/** Makes something happen, to the workbench as an editor would tell it, and to the world. */
function happen(workbench: Workbench, world: World, path: string, what: Happening): void {
  const uri = FOLDER + path;
  const text = textOf(world, path);
  switch (what.kind) {
    case 'disk':
      world.disk.set(path, what.content);
      workbench.setFile(uri, what.content);
      return;
    case 'open':
      world.buffers.set(path, what.text);
      workbench.openFile(uri, what.text);
      return;
    case 'close':
      world.buffers.delete(path);
      workbench.closeFile(uri);
      return;
    case 'edit':
    case 'uses': {
      if (text === undefined || workbench.snapshot(uri) === undefined) return;
      const start = text.indexOf('uses:');
      const lineEnd = text.indexOf('\n', start);
      const edits =
        what.kind === 'edit'
          ? editsOf(text, what.step)
          : [{ start: Math.max(start, 0), end: start < 0 || lineEnd < 0 ? 0 : lineEnd + 1, text: what.line }];
      const snapshot = workbench.snapshot(uri)!;
      const changes = [...edits]
        .sort((a, b) => b.start - a.start)
        .map((edit) => ({
          range: { start: snapshot.positionAt(edit.start), end: snapshot.positionAt(edit.end) },
          text: edit.text,
        }));
      workbench.editFile(uri, changes);
      const after = workbench.snapshot(uri)!.text();
      if (world.buffers.has(path)) world.buffers.set(path, after);
      else world.disk.set(path, { text: after });
    }
  }
}

/** Everything that is said of a file, and where, as plain data. */
function said(workbench: Workbench, path: string): unknown {
  const evaluation = workbench.evaluation(FOLDER + path);
  return (
    evaluation &&
    locatedFindings(evaluation).map(({ finding, range }) => {
      const { place: _, related, ...rest } = finding;
      return {
        ...rest,
        range,
        related: related.map(({ place, message }) => ({ message, at: located(evaluation, place) })),
      };
    })
  );
}

it('after anything that happens to files that use each other, the findings are those of reading all anew', () => {
  fc.assert(
    fc.property(
      fc.tuple(...PATHS.map(() => content)),
      fc.array(happening, { minLength: 1, maxLength: 8 }),
      (contents, happenings) => {
        const world: World = {
          disk: new Map(PATHS.map((path, index) => [path, contents[index]!])),
          buffers: new Map(),
        };
        const workbench = strictWorkbench();
        workbench.setFile(FOLDER + PATHS[0], contents[0]!);
        tellWanted(workbench, (path) => contentOf(world, path));
        for (const [path, what] of happenings) {
          happen(workbench, world, path, what);
          workbench.forgetUnused();
          tellWanted(workbench, (one) => world.disk.get(one) ?? 'missing');
          for (const one of PATHS) {
            if (!workbench.snapshot(FOLDER + one)) continue;
            const fresh = strictWorkbench();
            fresh.setFile(FOLDER + one, contentOf(world, one));
            tellWanted(fresh, (other) => contentOf(world, other));
            expect(said(workbench, one)).toEqual(said(fresh, one));
          }
        }
      },
    ),
    { numRuns: runs(200), seed: 20261211 },
  );
}, 600_000);
