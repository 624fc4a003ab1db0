// Drives the real editor with the packed extension: `node test/editor/run.mjs [VSIX]`. Without a VSIX it packs one.
// Installs the editor first where it is missing. Screenshots go to `.screenshots`.
import { execFileSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { openBrowser, settled } from './editor-page.mjs';
import { startEditor } from './editor-server.mjs';
import { install } from './install.mjs';
import { files, scenarios } from './scenarios.mjs';

const root = resolve(dirname(fileURLToPath(import.meta.url)), '../..');
const screenshots = join(root, '.screenshots');

function pack() {
  const { name, version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  execFileSync('npm', ['run', '--silent', 'package'], { cwd: root, stdio: ['ignore', 'ignore', 'inherit'] });
  return join(root, `${name}-${version}.vsix`);
}

async function runScenarios(editor, page) {
  let failed = 0;
  const shoot = async (name) => {
    await settled(page);
    await page.screenshot({ path: join(screenshots, `${name}.png`) });
  };
  for (const [title, scenario] of scenarios) {
    const start = Date.now();
    try {
      await scenario({ page, editor, shoot });
      console.log(`ok    ${title} (${Date.now() - start} ms)`);
    } catch (error) {
      failed++;
      await shoot(`failed-${scenario.name}`);
      console.log(`FAIL  ${title}\n      ${String(error.message).replaceAll('\n', '\n      ')}`);
    }
    // Closes whatever the scenario left open over the text.
    await page.keyboard.press('Escape');
    await page.keyboard.press('Escape');
  }
  return failed;
}

async function main() {
  install((line) => console.log(line));
  const vsix = process.argv[2] ? resolve(process.argv[2]) : pack();
  rmSync(screenshots, { recursive: true, force: true });
  mkdirSync(screenshots, { recursive: true });
  const editor = await startEditor(vsix, files);
  // Nothing that was started outlives this process, however it ends.
  for (const signal of ['SIGINT', 'SIGTERM']) process.once(signal, () => editor.stop().then(() => process.exit(1)));
  try {
    const browser = await openBrowser(editor.url);
    try {
      const failed = await runScenarios(editor, browser.page);
      console.log(`${scenarios.length - failed} passed, ${failed} failed`);
      process.exitCode = failed === 0 ? 0 : 1;
    } finally {
      await browser.close();
    }
  } finally {
    await editor.stop();
  }
}

await main();
