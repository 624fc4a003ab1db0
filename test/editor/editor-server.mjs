// Starts and stops the served editor, with fresh folders for its settings, its extensions and the workspace.
import { execFileSync, spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { editorEntry } from './install.mjs';

/** The settings of the person who tries the extension: nothing of it is ours but the quiet start. */
const SETTINGS = {
  'security.workspace.trust.enabled': false,
  'workbench.startupEditor': 'none',
  'workbench.tips.enabled': false,
  'workbench.colorTheme': 'Default Light Modern',
  'window.autoDetectColorScheme': false,
  'extensions.ignoreRecommendations': true,
  'telemetry.telemetryLevel': 'off',
  'editor.hover.delay': 150,
  'editor.minimap.enabled': false,
  'chat.commandCenter.enabled': false,
  'files.associations': { 'left-as-yaml.rig.yaml': 'yaml' },
};

function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

function makeFolders(files) {
  const base = mkdtempSync(join(tmpdir(), 'ratewright-editor-'));
  const folders = {
    base,
    userData: join(base, 'user-data'),
    extensions: join(base, 'extensions'),
    workspace: join(base, 'workspace'),
  };
  mkdirSync(join(folders.userData, 'User'), { recursive: true });
  mkdirSync(folders.extensions, { recursive: true });
  mkdirSync(folders.workspace, { recursive: true });
  writeFileSync(join(folders.userData, 'User/settings.json'), JSON.stringify(SETTINGS, null, 2));
  writeFileSync(join(base, 'config.yaml'), 'auth: none\n');
  for (const [name, content] of Object.entries(files)) {
    writeFileSync(join(folders.workspace, name), content.text);
  }
  return folders;
}

function environment() {
  const { PORT: _port, PASSWORD: _password, VSCODE_IPC_HOOK_CLI: _hook, ...rest } = process.env;
  return rest;
}

function whenListening(child) {
  return new Promise((resolve, reject) => {
    let said = '';
    const read = (chunk) => {
      said += chunk;
      if (said.includes('HTTP server listening')) resolve();
    };
    child.stdout.on('data', read);
    child.stderr.on('data', read);
    child.once('exit', (code) =>
      reject(new Error(`the editor's server ended with ${code} before it listened:\n${said}`)),
    );
  });
}

/**
 * Installs the packed extension and serves the editor on a free port.
 *
 * @param vsix path of the packed extension
 * @param files workspace files by name: `{ text }`
 */
export async function startEditor(vsix, files) {
  const folders = makeFolders(files);
  const shared = [
    editorEntry,
    ...['--config', join(folders.base, 'config.yaml')],
    ...['--user-data-dir', folders.userData],
    ...['--extensions-dir', folders.extensions],
  ];
  execFileSync(process.execPath, [...shared, '--install-extension', vsix], { stdio: 'pipe', env: environment() });
  const port = await freePort();
  const serving = ['--bind-addr', `127.0.0.1:${port}`, '--disable-telemetry', '--disable-update-check'];
  const child = spawn(process.execPath, [...shared, ...serving, folders.workspace], {
    env: environment(),
    stdio: ['ignore', 'pipe', 'pipe'],
    // A process group of its own, so that stopping it also stops the processes that it starts.
    detached: true,
  });
  const ended = new Promise((resolve) => child.once('exit', resolve));
  const stop = async () => {
    if (child.exitCode === null && child.signalCode === null) process.kill(-child.pid, 'SIGKILL');
    await ended;
    rmSync(folders.base, { recursive: true, force: true, maxRetries: 5 });
  };
  try {
    await whenListening(child);
  } catch (error) {
    await stop();
    throw error;
  }
  const url = `http://127.0.0.1:${port}/?folder=${encodeURIComponent(folders.workspace)}`;
  return { url, folders, stop };
}
