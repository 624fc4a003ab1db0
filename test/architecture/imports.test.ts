import { readdirSync, readFileSync } from 'node:fs';
import { dirname, join, relative, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';

const SERVER = resolve(import.meta.dirname, '../../server/src');

/** What each room may import from. A room may always import from itself. */
const MAY_IMPORT: Readonly<Record<string, readonly string[]>> = {
  signal: [],
  quantity: [],
  practices: ['quantity', 'signal'],
  rig: ['practices', 'quantity', 'signal'],
  chain: ['rig', 'quantity', 'signal'],
  checks: ['chain', 'rig', 'practices', 'quantity', 'signal'],
  remedies: ['checks', 'chain', 'rig', 'quantity', 'signal'],
  picture: ['chain', 'quantity', 'signal'],
  workbench: ['remedies', 'checks', 'chain', 'rig', 'quantity', 'signal'],
  report: ['workbench', 'picture', 'remedies', 'checks', 'chain', 'rig', 'practices', 'quantity', 'signal'],
  editor: ['workbench', 'picture', 'remedies', 'checks', 'chain', 'rig', 'practices', 'quantity', 'signal'],
  cli: [
    'report',
    'editor',
    'server',
    'workbench',
    'picture',
    'remedies',
    'checks',
    'chain',
    'rig',
    'quantity',
    'signal',
  ],
  server: ['editor', 'workbench', 'picture', 'remedies', 'checks', 'chain', 'rig', 'quantity', 'signal'],
};

/** The libraries that a room may use; `node:` stands for all of Node. */
const MAY_USE: Readonly<Record<string, readonly string[]>> = {
  signal: ['fft.js'],
  quantity: [],
  practices: [],
  rig: ['yaml'],
  chain: [],
  checks: [],
  remedies: [],
  picture: [],
  workbench: [],
  report: [],
  editor: ['vscode-languageserver-types', 'vscode-languageserver-protocol'],
  cli: ['node:', 'diff', 'ignore', 'vscode-languageserver'],
  server: ['node:', 'vscode-languageserver'],
};

interface ImportLine {
  readonly file: string;
  readonly room: string;
  readonly target: string;
}

function filesBelow(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((item) =>
    item.isDirectory() ? filesBelow(join(folder, item.name)) : [join(folder, item.name)],
  );
}

function roomOf(path: string): string {
  const [first = ''] = relative(SERVER, path).split('/');
  return first.startsWith('server') && first.endsWith('.ts') ? 'server' : first;
}

const files = filesBelow(SERVER).filter((file) => file.endsWith('.ts'));
const imports: readonly ImportLine[] = files.flatMap((file) =>
  [
    ...readFileSync(file, 'utf8').matchAll(
      /^(?:import|export)\b[^;'"]*?from\s+['"]([^'"]+)['"]|import\(\s*['"]([^'"]+)['"]\s*\)|^import\s+['"]([^'"]+)['"]/gm,
    ),
  ].map((match) => ({ file: relative(SERVER, file), room: roomOf(file), target: (match[1] ?? match[2] ?? match[3])! })),
);

describe('the rooms of the server', () => {
  it('are the rooms of the plan', () => {
    expect([...new Set(files.map(roomOf))].sort()).toEqual(Object.keys(MAY_IMPORT).sort());
  });

  it('import only from rooms below them', () => {
    const wrong = imports
      .filter(({ target }) => target.startsWith('.'))
      .map((line) => ({ ...line, to: roomOf(resolve(SERVER, dirname(line.file), line.target)) }))
      .filter(({ room, to }) => to !== room && !MAY_IMPORT[room]?.includes(to))
      .map(({ file, target }) => `${file} imports ${target}`);
    expect(wrong).toEqual([]);
  });

  it('use only the libraries that are theirs', () => {
    const wrong = imports
      .filter(({ target }) => !target.startsWith('.'))
      .filter(
        ({ room, target }) =>
          !(MAY_USE[room] ?? []).some(
            (library) => target === library || target.startsWith(library.endsWith(':') ? library : `${library}/`),
          ),
      )
      .map(({ file, target }) => `${file} uses ${target}`);
    expect(wrong).toEqual([]);
  });

  it('have no circles of files', () => {
    const edges = new Map<string, string[]>();
    for (const { file, target } of imports) {
      if (!target.startsWith('.')) continue;
      const to = relative(SERVER, resolve(SERVER, dirname(file), target));
      edges.set(file, [...(edges.get(file) ?? []), to]);
    }
    expect(circles(edges)).toEqual([]);
  });

  it('keep every file short enough to read at one sitting', () => {
    const long = files
      .filter((file) => readFileSync(file, 'utf8').split('\n').length > 400)
      .map((file) => relative(SERVER, file));
    expect(long).toEqual([]);
  });
});

function circles(edges: ReadonlyMap<string, readonly string[]>): string[] {
  const found: string[] = [];
  const done = new Set<string>();
  const visit = (file: string, path: readonly string[]): void => {
    if (path.includes(file)) {
      found.push([...path.slice(path.indexOf(file)), file].join(' -> '));
      return;
    }
    if (done.has(file)) return;
    for (const next of edges.get(file) ?? []) visit(next, [...path, file]);
    done.add(file);
  };
  for (const file of edges.keys()) visit(file, []);
  return found;
}
