import { PassThrough } from 'node:stream';
import { afterEach, expect, it, vi } from 'vitest';
import type { PublishDiagnosticsParams } from 'vscode-languageserver-protocol';
import {
  createProtocolConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from 'vscode-languageserver-protocol/node';
import { ran } from './ran.ts';
import { FOLDS } from './rigs.ts';

afterEach(() => {
  vi.restoreAllMocks();
});

it.each([[[]], [['--stdio']]])(
  'serve %j speaks the protocol on standard input and output until it is told to go',
  async (options) => {
    const toServer = new PassThrough();
    const fromServer = new PassThrough();
    vi.spyOn(process, 'stdin', 'get').mockReturnValue(toServer as never);
    vi.spyOn(process, 'stdout', 'get').mockReturnValue(fromServer as never);
    // The library ends the process when it is told to exit.
    const exit = vi.spyOn(process, 'exit').mockReturnValue(undefined as never);
    const ended = ran(['serve', ...options]);
    const client = createProtocolConnection(new StreamMessageReader(fromServer), new StreamMessageWriter(toServer));
    const published = new Promise<PublishDiagnosticsParams>((resolve) => {
      client.onNotification('textDocument/publishDiagnostics', resolve);
    });
    client.onRequest('client/registerCapability', () => null);
    client.listen();
    const { capabilities } = (await client.sendRequest('initialize', {
      processId: null,
      rootUri: null,
      capabilities: {},
    })) as { capabilities: Readonly<Record<string, unknown>> };
    expect(capabilities).toHaveProperty('hoverProvider');
    await client.sendNotification('initialized', {});
    await client.sendNotification('textDocument/didOpen', {
      textDocument: { uri: 'file:///a.rig.yaml', languageId: 'rig', version: 1, text: FOLDS },
    });
    expect((await published).diagnostics.map(({ code }) => code)).toEqual(['fold-in-band']);
    await client.sendRequest('shutdown');
    await client.sendNotification('exit');
    // Nothing but the protocol goes to standard output, and nothing at all to standard error.
    expect(await ended).toMatchObject({ code: 0, stdout: '', stderr: '' });
    await vi.waitFor(() => expect(exit).toHaveBeenCalledWith(0));
    client.dispose();
  },
);
