// Installs the editor that the tests drive, once: the npm package code-server (VS Code served to a browser) in the ignored
// folder `.editor`, and Debian's chromium where it is missing. Running it again when all is there does nothing.
import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

const VERSION = '4.100.3';
const root = resolve(dirname(fileURLToPath(import.meta.url)), '../..');

export const editorFolder = join(root, '.editor');
export const editorEntry = join(editorFolder, 'node_modules/code-server/out/node/entry.js');
export const chromium = '/usr/bin/chromium';

/**
 * Modules with native parts that the served editor loads; install scripts are off, so they are built here. The terminal's
 * is left out: no test opens one.
 */
const NATIVE = ['@vscode/spdlog', 'native-watchdog', '@parcel/watcher', '@vscode/deviceid'];

function run(command, args, folder) {
  execFileSync(command, args, {
    cwd: folder,
    stdio: ['ignore', 'ignore', 'inherit'],
    env: { ...process.env, CI: '1' },
  });
}

function npm(args, folder) {
  run('npm', [...args, '--no-audit', '--no-fund', '--loglevel=error'], folder);
}

function stamped(file) {
  return existsSync(file) && readFileSync(file, 'utf8').trim() === VERSION;
}

function installEditor(say) {
  const stamp = join(editorFolder, 'complete');
  if (stamped(stamp)) return;
  say(`installing the editor (code-server ${VERSION}) into .editor, once; this takes a minute or two`);
  rmSync(editorFolder, { recursive: true, force: true });
  mkdirSync(editorFolder, { recursive: true });
  writeFileSync(
    join(editorFolder, 'package.json'),
    `${JSON.stringify({ private: true, dependencies: { 'code-server': VERSION } }, null, 2)}\n`,
  );
  npm(['install', '--ignore-scripts', '--omit=dev'], editorFolder);
  const vscode = join(editorFolder, 'node_modules/code-server/lib/vscode');
  npm(['install', '--ignore-scripts', '--omit=dev'], vscode);
  npm(['install', '--ignore-scripts', '--omit=dev'], join(vscode, 'extensions'));
  npm(['rebuild', 'argon2', '--build-from-source'], editorFolder);
  npm(['rebuild', ...NATIVE], vscode);
  const archive = join(vscode, 'node_modules.asar');
  if (!existsSync(archive)) symlinkSync('node_modules', archive);
  writeFileSync(stamp, `${VERSION}\n`);
}

function installBrowser(say) {
  if (existsSync(chromium)) return;
  say('installing chromium with apt-get');
  run('apt-get', ['update', '-qq'], root);
  run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium', 'fonts-dejavu-core'], root);
}

/** Puts everything in place; `say` is told what is going on when something has to be fetched. */
export function install(say) {
  installEditor(say);
  installBrowser(say);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) install((line) => console.log(line));
