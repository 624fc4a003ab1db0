import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterEach, describe, expect, it } from 'vitest';
import type { Diagnostic } from 'vscode-languageserver-types';
import { LIBRARY, USER } from '../workbench/used.ts';
import type { ClientOptions, TestClient } from './client.ts';
import { startClient } from './client.ts';

const made: string[] = [];
const clients: TestClient[] = [];

afterEach(() => {
  for (const one of clients.splice(0)) one.connection.dispose();
  for (const folder of made.splice(0)) rmSync(folder, { recursive: true, force: true });
});

/** A folder with a library in it, and a client that has it open. */
async function opened(options: Partial<ClientOptions> = {}) {
  const folder = mkdtempSync(join(tmpdir(), 'ratewright-uses-'));
  made.push(folder);
  mkdirSync(join(folder, 'common'));
  const path = join(folder, 'common/lib.rig.yaml');
  writeFileSync(path, LIBRARY);
  const uri = (name: string): string => pathToFileURL(join(folder, name)).href;
  const client = await startClient({ pull: true, folders: [pathToFileURL(folder).href], ...options });
  clients.push(client);
  return { folder, path, client, rig: uri('a.rig.yaml'), library: uri('common/lib.rig.yaml'), uri };
}

const QUIET = LIBRARY.replace('level: 1 V', 'level: 1 mV');
const codes = (diagnostics: readonly Diagnostic[]): readonly unknown[] => diagnostics.map(({ code }) => code);

/** Ends when the server asks to pull again. */
function refreshAsked({ connection }: TestClient): Promise<void> {
  return new Promise((resolve) => {
    connection.onRequest('workspace/diagnostic/refresh', () => {
      resolve();
      return null;
    });
  });
}

describe('a rig that uses a file which is not open', () => {
  it('has it read from the disk, and its places told as places of that file', async () => {
    const { client, rig, library } = await opened();
    client.open(rig, USER);
    const found = await client.pull(rig);
    expect(codes(found)).toEqual(['fold-in-band']);
    expect(found[0]!.relatedInformation?.map(({ location }) => location)).toEqual([
      { uri: library, range: { start: { line: 10, character: 2 }, end: { line: 10, character: 7 } } },
      { uri: library, range: { start: { line: 8, character: 2 }, end: { line: 8, character: 6 } } },
    ]);
  });

  it('is checked again when the file changes on the disk, comes, or goes', async () => {
    const { client, rig, library, path } = await opened({ watchesAndRefreshes: true });
    client.open(rig, USER);
    expect(codes(await client.pull(rig))).toEqual(['fold-in-band']);
    expect(client.registered).toContain('workspace/didChangeWatchedFiles');
    const pulledAfter = async (type: number): Promise<readonly unknown[]> => {
      const asked = refreshAsked(client);
      void client.connection.sendNotification('workspace/didChangeWatchedFiles', { changes: [{ uri: library, type }] });
      await asked;
      return codes(await client.pull(rig));
    };
    writeFileSync(path, QUIET);
    expect(await pulledAfter(2)).toEqual(['filter-short']);
    rmSync(path);
    expect(await pulledAfter(3)).toContain('unknown-name');
    writeFileSync(path, LIBRARY);
    expect(await pulledAfter(1)).toEqual(['fold-in-band']);
  });

  it('is not told of files that nobody uses', async () => {
    const { client, rig, uri } = await opened({ watchesAndRefreshes: true });
    client.open(rig, USER);
    await client.pull(rig);
    let asked = false;
    void refreshAsked(client).then(() => {
      asked = true;
    });
    void client.connection.sendNotification('workspace/didChangeWatchedFiles', {
      changes: [{ uri: uri('other.rig.yaml'), type: 2 }],
    });
    await client.pull(rig);
    expect(asked).toBe(false);
  });

  it('does not have files read that lie outside the open folders', async () => {
    const { client, uri } = await opened({ folders: [] });
    const one = uri('sub/a.rig.yaml');
    client.open(one, USER.replace('common/lib', '../common/lib'));
    const [first] = await client.pull(one);
    expect(first!.message).toMatch(/ is not read, because it lies outside the folders that are open\./);
    // Without open folders, a file's own may be read.
    const two = uri('a.rig.yaml');
    client.open(two, USER);
    expect(codes(await client.pull(two))).toEqual(['fold-in-band']);
  });

  it('has it read when its folder is opened', async () => {
    const { client, folder, uri } = await opened({ folders: [] });
    const rig = uri('sub/a.rig.yaml');
    client.open(rig, USER.replace('common/lib', '../common/lib'));
    expect(codes(await client.pull(rig))).toContain('unknown-name');
    void client.connection.sendNotification('workspace/didChangeWorkspaceFolders', {
      event: { added: [{ uri: pathToFileURL(folder).href, name: 'rigs' }], removed: [] },
    });
    expect(codes(await client.pull(rig))).toEqual(['fold-in-band']);
  });
});

describe('a rig and a file that it uses, both open', () => {
  it('are checked together: an edit in the one asks to pull the other again', async () => {
    const { client, rig, library } = await opened({ watchesAndRefreshes: true });
    client.open(rig, USER);
    client.open(library, LIBRARY);
    expect(codes(await client.pull(rig))).toEqual(['fold-in-band']);
    const asked = refreshAsked(client);
    const at = LIBRARY.split('\n')[10]!.indexOf('1 V');
    client.change(library, '1 mV', { line: 10, character: at }, { line: 10, character: at + 3 });
    await asked;
    expect(codes(await client.pull(rig))).toEqual(['filter-short']);
    // Closed without being saved, it is what the disk holds again.
    client.close(library);
    expect(codes(await client.pull(rig))).toEqual(['fold-in-band']);
  });

  it('have findings pushed to both where the client does not pull', async () => {
    const { client, rig, library } = await opened({ pull: false });
    client.open(rig, USER);
    expect(codes(await client.pushed(rig, 1))).toEqual(['fold-in-band']);
    client.open(library, LIBRARY);
    await client.pushed(library, 1);
    const next = new Promise<readonly Diagnostic[]>((resolve) => {
      client.connection.onNotification('textDocument/publishDiagnostics', ({ uri, diagnostics }) => {
        if (uri === rig && diagnostics[0]?.code !== 'fold-in-band') resolve(diagnostics);
      });
    });
    client.change(library, QUIET);
    expect(codes(await next)).toEqual(['filter-short']);
  });

  it('are found whichever way the client writes their URIs', async () => {
    const { client, rig, library } = await opened();
    client.open(library.replace('lib', '%6Cib'), QUIET);
    client.open(rig, USER);
    const [found] = await client.pull(rig);
    expect(found!.code).toBe('filter-short');
    expect(found!.relatedInformation!.at(-1)!.location.uri).toBe(library.replace('lib', '%6Cib'));
  });
});
