// What a person must be able to do, as they do it. Each scenario has a file of its own and ends with what it looked for
// shown on the screen, or throws.
import assert from 'node:assert/strict';
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import {
  chooseByKeys,
  clickByMouse,
  goTo,
  hoverOver,
  openFile,
  pointAtNothing,
  retypeFrom,
  runCommand,
  squiggles,
  textOver,
  waitForSquiggles,
  webview,
} from './editor-page.mjs';
import { FAN, FAN_RATE, TWO_CHANNELS, WHOLE_CHAIN } from './rigs.mjs';

const PICTURE = 'img[src^="data:image/svg+xml;base64,"]';

/** The workspace, by file name. */
export const files = {
  'findings.rig.yaml': { text: FAN },
  'left-as-yaml.rig.yaml': { text: FAN },
  'typing.rig.yaml': { text: FAN },
  'extract-fan.rig.yaml': { text: FAN },
  'quick-fix.rig.yaml': { text: FAN },
  'completion.rig.yaml': { text: FAN },
  'fix-every.rig.yaml': { text: TWO_CHANNELS },
  'restart.rig.yaml': { text: FAN },
  'whole-chain.rig.yaml': { text: WHOLE_CHAIN },
};

async function findingsUnderTheRightWord({ page }) {
  for (const name of ['findings.rig.yaml', 'left-as-yaml.rig.yaml']) {
    await openFile(page, name);
    await waitForSquiggles(page, 'error', 1);
    assert.equal(await textOver(squiggles(page, 'error').first()), '25.6 kHz', name);
  }
}

async function findingsFollowTheTyping({ page }) {
  await openFile(page, 'typing.rig.yaml');
  await waitForSquiggles(page, 'error', 1);
  await retypeFrom(page, FAN_RATE, '51.2 kHz');
  await waitForSquiggles(page, 'error', 0);
  await retypeFrom(page, FAN_RATE, '25.6 kHz');
  await waitForSquiggles(page, 'error', 1);
  assert.equal(await textOver(squiggles(page, 'error').first()), '25.6 kHz');
}

async function hoverShowsThePicture({ page, shoot }) {
  // The picture for the README: nothing else is open.
  await runCommand(page, 'View: Close All Editors');
  await page.locator('.tab').waitFor({ state: 'detached' });
  await openFile(page, 'extract-fan.rig.yaml');
  await waitForSquiggles(page, 'error', 1);
  const hover = await hoverOver(page, squiggles(page, 'error').first());
  await hover.locator(PICTURE).waitFor();
  await hover.locator('table').first().waitFor();
  await shoot('hover-rate');
  await page.keyboard.press('Escape');
  // On the channel's name no finding stands above the picture.
  await (await hoverOver(page, channelName(page))).locator(PICTURE).waitFor();
  await shoot('hover-light');
  await page.keyboard.press('Escape');
  await wholeChainIsShown(page, shoot);
}

/** Images of a pattern on the map, the noise in the band, and a channel that does not go with its group. */
async function wholeChainIsShown(page, shoot) {
  await openFile(page, 'whole-chain.rig.yaml');
  await waitForSquiggles(page, 'error', 1);
  await (await hoverOver(page, channelName(page, 'strut'))).locator(PICTURE).waitFor();
  await shoot('pattern-map');
  await page.keyboard.press('Escape');
  const hover = await hoverOver(page, channelName(page, 'top'));
  await hover.locator('table', { hasText: 'sensor' }).first().scrollIntoViewIfNeeded();
  await shoot('noise-budget');
  await page.keyboard.press('Escape');
  const late = page.locator('.editor-group-container.active .view-line span', { hasText: /^leg$/ }).last();
  await hoverOver(page, late);
  await shoot('group-finding');
}

function channelName(page, name = 'bearing-drive-end') {
  return page.locator('.editor-group-container.active .view-line span', { hasText: new RegExp(`^${name}$`) }).last();
}

async function findingsNameOpensItsPage({ page, shoot }) {
  await openFile(page, 'extract-fan.rig.yaml');
  const hover = await hoverOver(page, squiggles(page, 'error').first());
  await hover.locator('a.code-link', { hasText: 'fold-in-band' }).click();
  await page.locator('.tab.active', { hasText: 'fold-in-band.md' }).waitFor();
  await webview(page).locator('h1', { hasText: 'fold-in-band' }).waitFor();
  await shoot('reference-page');
}

async function quickFixByMouse({ page, shoot }) {
  await openFile(page, 'quick-fix.rig.yaml');
  await waitForSquiggles(page, 'error', 1);
  const hover = await hoverOver(page, squiggles(page, 'error').first());
  await hover.locator('a', { hasText: 'Quick Fix' }).click();
  const offer = page.locator('.action-widget .monaco-list-row', { hasText: /^Sample at/ }).first();
  await offer.waitFor();
  await shoot('quick-fix');
  await clickByMouse(offer);
  await waitForSquiggles(page, 'error', 0);
}

async function completionOffersReachableRates({ page, shoot }) {
  await openFile(page, 'completion.rig.yaml');
  await goTo(page, { line: FAN_RATE.line, column: FAN_RATE.column - 1 });
  await page.keyboard.press('Shift+End');
  await page.keyboard.press('Delete');
  await page.keyboard.type(' ');
  await page.keyboard.press('Control+Space');
  const offer = page.locator('.suggest-widget.visible .monaco-list-row', { hasText: '51.2 kHz' }).first();
  await offer.waitFor();
  await shoot('completion');
  await offer.click();
  await page.locator('.view-line', { hasText: /rate:\s51\.2\skHz/ }).waitFor();
}

async function outlineListsTheChannels({ page, shoot }) {
  await openFile(page, 'findings.rig.yaml');
  // Rows that are out of sight are not there at all, so the outline is given the room of the files.
  const header = (name) => page.locator('.pane-header', { hasText: name });
  await header('Outline').click();
  await header('workspace').click();
  await page.locator('.outline-tree .monaco-list-row', { hasText: 'bearing-drive-end' }).waitFor();
  await shoot('outline');
  await header('workspace').click();
  await header('Outline').click();
}

async function showAliasMap({ page, shoot }) {
  await openFile(page, 'findings.rig.yaml');
  await goTo(page, FAN_RATE);
  await runCommand(page, 'Ratewright: Show alias map');
  await page.locator('.tab', { hasText: 'bearing-drive-end' }).waitFor();
  await webview(page).locator(PICTURE).waitFor();
  await pointAtNothing(page);
  await shoot('alias-map');
  await page.locator('.tab', { hasText: 'bearing-drive-end' }).locator('.codicon-close').click();
  await page.locator('.tab', { hasText: 'bearing-drive-end' }).waitFor({ state: 'detached' });
}

async function fixEveryChannel({ page }) {
  await openFile(page, 'fix-every.rig.yaml');
  await waitForSquiggles(page, 'error', 2);
  await runCommand(page, 'Ratewright: Fix every channel');
  await waitForSquiggles(page, 'error', 0);
}

async function newFileFromSample({ page }) {
  await runCommand(page, 'Ratewright: New rig file from sample');
  const sample = page.locator('.quick-input-list .monaco-list-row', { hasText: /fan/i }).first();
  await sample.waitFor();
  await sample.click();
  await page.locator('.tab.active', { hasText: 'Untitled-1' }).waitFor();
  await squiggles(page, 'error').or(squiggles(page, 'warning')).first().waitFor();
}

/** The processes that run the extension's server out of the folder of this run's extensions. */
function serverProcesses(extensions) {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .filter((pid) => {
      try {
        const command = readFileSync(join('/proc', pid, 'cmdline'), 'utf8');
        return command.includes(extensions) && command.includes('server.cjs');
      } catch {
        return false;
      }
    })
    .map(Number);
}

async function killedServerComesBack({ page, editor }) {
  await openFile(page, 'restart.rig.yaml');
  await waitForSquiggles(page, 'error', 1);
  const [pid, ...others] = serverProcesses(editor.folders.extensions);
  assert.ok(pid !== undefined && others.length === 0, 'one server runs');
  process.kill(pid, 'SIGKILL');
  await retypeFrom(page, FAN_RATE, '51.2 kHz');
  await waitForSquiggles(page, 'error', 0);
  await retypeFrom(page, FAN_RATE, '25.6 kHz');
  await waitForSquiggles(page, 'error', 1);
  assert.ok(!serverProcesses(editor.folders.extensions).includes(pid), 'another server runs');
}

/** To be looked at: a finding's own hover, and the map beside the text. */
async function findingsAndMapInTheDark(page, shoot) {
  await hoverOver(page, squiggles(page, 'error').first());
  await shoot('hover-rate-dark');
  await page.keyboard.press('Escape');
  await goTo(page, FAN_RATE);
  await runCommand(page, 'Ratewright: Show alias map');
  const map = page.locator('.tab', { hasText: 'bearing-drive-end' });
  await map.waitFor();
  await webview(page).locator(PICTURE).waitFor();
  await pointAtNothing(page);
  await shoot('alias-map-dark');
  await map.locator('.codicon-close').click();
  await map.waitFor({ state: 'detached' });
}

async function picturesFollowTheTheme({ page, shoot }) {
  const seen = new Set();
  await openFile(page, 'extract-fan.rig.yaml');
  for (const [theme, root, name] of [
    ['Dark Modern', '.vs-dark', 'hover-dark'],
    ['Dark High Contrast', '.hc-black', 'hover-high-contrast'],
    ['Light High Contrast', '.hc-light', 'hover-high-contrast-light'],
  ]) {
    await runCommand(page, 'Preferences: Color Theme');
    await chooseByKeys(page, theme);
    await page.locator(`.monaco-workbench${root}`).waitFor();
    const hover = await hoverOver(page, channelName(page));
    const picture = hover.locator(PICTURE);
    await picture.waitFor();
    seen.add(await picture.getAttribute('src'));
    await shoot(name);
    await page.keyboard.press('Escape');
    if (theme === 'Dark Modern') await findingsAndMapInTheDark(page, shoot);
  }
  assert.equal(seen.size, 3, 'three themes, three pictures');
}

/** In the order in which they run: what needs the light theme first. */
export const scenarios = [
  ['findings appear under the right word, in a file left as YAML too', findingsUnderTheRightWord],
  ['findings come and go while typing', findingsFollowTheTyping],
  ['pointing at a rate shows its alias map and a table', hoverShowsThePicture],
  ["a finding's name opens its reference page", findingsNameOpensItsPage],
  ['a quick fix chosen by mouse makes the finding go', quickFixByMouse],
  ['completion after `rate:` offers rates that the clock can make', completionOffersReachableRates],
  ['the outline lists the channels', outlineListsTheChannels],
  ['the command shows the alias map beside the text', showAliasMap],
  ['one command fixes every channel', fixEveryChannel],
  ['a new file from a sample is checked before it is saved', newFileFromSample],
  ['a server that was killed comes back', killedServerComesBack],
  ['pictures follow the theme: dark, and both of high contrast', picturesFollowTheTheme],
];
