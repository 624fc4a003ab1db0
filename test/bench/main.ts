import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { performance } from 'node:perf_hooks';
import { parseDocument } from 'yaml';
import { diagnosticsOf } from '../../server/src/editor/diagnostics.ts';
import { NO_LINKS } from '../../server/src/editor/reference-links.ts';
import { SLICE_MS } from '../../server/src/server.ts';
import { allFindings } from '../../server/src/workbench/findings.ts';
import type { TextChange } from '../../server/src/workbench/workbench.ts';
import { Workbench } from '../../server/src/workbench/workbench.ts';
import { startClient } from '../protocol/client.ts';
import { TODAY } from '../tools/today.ts';
import { median, percentile, timesOf } from './measure.ts';
import { generatedRig } from './rigs.ts';

const SIZES = [64, 1_000, 10_000] as const;
const SERVER = [process.execPath, 'dist/server.cjs', '--stdio'] as const;
const URI = 'file:///bench.rig.yaml';

interface Row {
  readonly what: string;
  readonly limits: readonly string[];
  readonly figures: readonly string[];
}

const rows: Row[] = [];
const ratio = (value: number): string => `${value.toFixed(2)} x`;
const ms = (value: number): string => `${value.toFixed(1)} ms`;
const newBench = (): Workbench =>
  new Workbench(
    (message) => console.error(message),
    () => TODAY,
  );

/** A small rig has to be read many times before the code that reads it is warm. */
function warmUpsFor(text: string): number {
  return Math.max(2, Math.round(2e6 / text.length));
}

function baselineMs(text: string): number {
  return median(timesOf(() => parseDocument(text, { uniqueKeys: false }), 9, warmUpsFor(text)));
}

function opened(text: string): Workbench {
  const workbench = newBench();
  workbench.setFile(URI, { text });
  workbench.evaluation(URI);
  return workbench;
}

/** Changes that write digit after digit into the band of a channel in the middle of the text. */
function digitInChannel(text: string, index: number, round: number): TextChange {
  const at = text.indexOf('-6', text.indexOf('fold-limit', text.indexOf(`channel-${index}`))) + 2;
  return replaceAt(text, at, at + 1, String(round % 5));
}

function replaceAt(text: string, start: number, end: number, by: string): TextChange {
  const position = (offset: number) => {
    const before = text.lastIndexOf('\n', offset - 1);
    return { line: text.slice(0, offset).split('\n').length - 1, character: offset - before - 1 };
  };
  return { range: { start: position(start), end: position(end) }, text: by };
}

function fullCheck(text: string): number {
  return median(
    timesOf(
      () => {
        opened(text);
      },
      9,
      warmUpsFor(text),
    ),
  );
}

function editInChannel(text: string, size: number): readonly number[] {
  const workbench = opened(text);
  const changes = Array.from({ length: 40 }, (_, round) =>
    digitInChannel(text, Math.floor(size / 2) + (round % 9), round),
  );
  let round = 0;
  return timesOf(
    () => {
      workbench.editFile(URI, [changes[round++ % changes.length]!]);
      diagnosticsOf(URI, workbench.evaluation(URI)!, NO_LINKS);
    },
    100,
    20,
  );
}

/** An edit of the cutoff of the filter that every channel uses: total time, and the longest slice. */
function editOfAll(text: string): { readonly total: number; readonly slice: number } {
  const workbench = opened(text);
  const at = text.indexOf('9.5 kHz');
  const totals: number[] = [];
  const slices: number[] = [];
  const warm = warmUpsFor(text);
  for (let round = 0; round < warm + 9; round++) {
    const start = performance.now();
    workbench.editFile(URI, [replaceAt(text, at, at + 3, round % 2 ? '9.5' : '9.6')]);
    const steps = workbench.evaluating(URI, at);
    for (let done = false; !done; ) {
      const sliceStart = performance.now();
      do done = steps.next().done === true;
      while (!done && performance.now() - sliceStart < SLICE_MS);
      if (round >= warm) slices.push(performance.now() - sliceStart);
    }
    if (round >= warm) totals.push(performance.now() - start);
  }
  return { total: median(totals), slice: Math.max(...slices) };
}

function editInFlow(size: number, style: 'flow' | 'json'): number {
  const text = generatedRig(size, style);
  const base = baselineMs(text);
  const workbench = opened(text);
  const changes = Array.from({ length: 20 }, (_, round) => digitInChannel(text, Math.floor(size / 2), round));
  let round = 0;
  const took = median(
    timesOf(() => {
      workbench.editFile(URI, [changes[round++ % changes.length]!]);
      diagnosticsOf(URI, workbench.evaluation(URI)!, NO_LINKS);
    }),
  );
  return took / base;
}

function remediesAtOne(text: string): number {
  // A loud carrier just under the first rate, and a filter that begins too late: a fold in the band of many channels.
  const faulty = text
    .replace('carrier: 16 kHz', 'carrier: 24 kHz')
    .replace('level: 40 mV', 'level: 4 V')
    .replaceAll('cutoff: 9.5 kHz', 'cutoff: 12 kHz');
  const workbench = opened(faulty);
  const finding = [...allFindings(workbench.evaluation(URI)!)].find((one) => one.check === 'fold-in-band');
  if (!finding) throw new Error('The generated rig has no fold to remedy.');
  let offered = 0;
  const took = median(
    timesOf(
      () => {
        offered = workbench.remedies(URI, finding, () => false).length;
      },
      9,
      8,
    ),
  );
  if (offered === 0) throw new Error('No remedy was offered.');
  return took;
}

async function overProtocol(text: string, size: number): Promise<readonly number[]> {
  const client = await startClient({ pull: false, spawn: SERVER });
  client.open(URI, text);
  await client.pushed(URI, 1);
  const times: number[] = [];
  for (let round = 0; round < 60; round++) {
    const change = digitInChannel(text, Math.floor(size / 2) + (round % 9), round);
    const start = performance.now();
    const version = client.change(URI, change.text, change.range!.start, change.range!.end);
    await client.pushed(URI, version);
    if (round >= 15) times.push(performance.now() - start);
  }
  await client.stop();
  return times;
}

async function startToFindings(): Promise<number> {
  const text = generatedRig(64, 'block');
  const times: number[] = [];
  for (let round = 0; round < 7; round++) {
    const start = performance.now();
    const client = await startClient({ pull: false, spawn: SERVER });
    client.open(URI, text);
    await client.pushed(URI, 1);
    times.push(performance.now() - start);
    await client.stop();
  }
  return median(times);
}

/** Peak resident memory of the server after opening the largest rig, editing one channel and editing all. */
async function peakMemoryMb(): Promise<number> {
  const text = generatedRig(10_000, 'block');
  const client = await startClient({ pull: false, spawn: SERVER });
  client.open(URI, text);
  await client.pushed(URI, 1);
  for (let round = 0; round < 20; round++) {
    const change = digitInChannel(text, 5_000, round);
    await client.pushed(URI, client.change(URI, change.text, change.range!.start, change.range!.end));
  }
  const at = text.indexOf('9.5 kHz');
  const all = replaceAt(text, at, at + 3, '9.6');
  await client.pushed(URI, client.change(URI, all.text, all.range!.start, all.range!.end));
  const status = readFileSync(`/proc/${client.child!.pid}/status`, 'utf8');
  await client.stop();
  return Number(/VmHWM:\s+(\d+)/.exec(status)?.[1] ?? Number.NaN) / 1024;
}

function packageMb(): string {
  const file = readdirSync('.').find((name) => name.endsWith('.vsix'));
  return file && existsSync(file) ? `${(statSync(file).size / 1e6).toFixed(2)} MB` : 'not packed';
}

async function main(): Promise<void> {
  const texts = SIZES.map((size) => generatedRig(size, 'block'));
  const bases = texts.map(baselineMs);
  const add = (what: string, limits: readonly string[], figures: readonly string[]): void => {
    rows.push({ what, limits, figures });
    console.error(`${what}: ${figures.join('  ')}`);
  };
  add('baseline: parseDocument', ['', '', ''], bases.map(ms));
  add(
    'full check over the baseline',
    ['1.4 x', '1.4 x', '1.4 x'],
    texts.map((text, index) => ratio(fullCheck(text) / bases[index]!)),
  );
  const edits = texts.map((text, index) => editInChannel(text, SIZES[index]!));
  add(
    'edit inside one channel',
    ['5 ms', '5 ms', '10 ms'],
    edits.map((times) => ms(median(times))),
  );
  add(
    'the same, 95th percentile',
    ['', '', '20 ms'],
    edits.map((times) => ms(percentile(times, 0.95))),
  );
  const sent: string[] = [];
  for (const [index, text] of texts.entries()) sent.push(ms(median(await overProtocol(text, SIZES[index]!))));
  add('edit sent to findings received', ['15 ms', '20 ms', '25 ms'], sent);
  const alls = texts.map((text, index) => ({ ...editOfAll(text), base: bases[index]! }));
  add(
    'edit of what all use, over the baseline',
    ['0.5 x', '0.5 x', '0.5 x'],
    alls.map(({ total, base }) => ratio(total / base)),
  );
  add(
    'its longest slice',
    ['20 ms', '20 ms', '20 ms'],
    alls.map(({ slice }) => ms(slice)),
  );
  add(
    'edit in flow style, over the baseline',
    ['1.2 x', '1.2 x', '1.2 x'],
    SIZES.map((size) => ratio(editInFlow(size, 'flow'))),
  );
  add(
    'edit in JSON, over the baseline',
    ['1.2 x', '1.2 x', '1.2 x'],
    SIZES.map((size) => ratio(editInFlow(size, 'json'))),
  );
  add(
    'remedies at one finding',
    ['100 ms', '100 ms', '100 ms'],
    texts.map((text) => ms(remediesAtOne(text))),
  );
  add('peak memory of the server', ['', '', '450 MB'], ['', '', `${(await peakMemoryMb()).toFixed(0)} MB`]);
  add('server start to first findings', ['300 ms', '', ''], [ms(await startToFindings()), '', '']);
  add('.vsix', ['1 MB', '', ''], [packageMb(), '', '']);
  console.log(table());
}

function table(): string {
  const head = `| what | ${SIZES.map((size) => size.toLocaleString('en')).join(' | ')} |\n|---|---|---|---|`;
  const cell = (figure: string, limit: string): string => (limit === '' ? figure : `${figure} (limit ${limit})`);
  const lines = rows.map(
    ({ what, figures, limits }) =>
      `| ${what} | ${figures.map((figure, index) => cell(figure, limits[index] ?? '')).join(' | ')} |`,
  );
  return [head, ...lines].join('\n');
}

void main();
