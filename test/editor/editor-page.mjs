// What a person does in the editor, in terms of what they see: open, point, type, choose. Every step waits for what it
// causes to be shown; none waits for time to pass.
import { chromium as playwright } from 'playwright-core';
import { chromium } from './install.mjs';

const FLAGS = [
  ...['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'],
  ...['--disable-background-networking', '--disable-component-update', '--disable-sync'],
];

/** How long anything may take to be shown, in milliseconds. */
const PATIENCE_MS = 20_000;

const WIDTH = 1440;
const HEIGHT = 900;

/** Opens the browser on the served editor; `close` ends it. */
export async function openBrowser(url) {
  const browser = await playwright.launch({ executablePath: chromium, args: FLAGS });
  const context = await browser.newContext({ viewport: { width: WIDTH, height: HEIGHT }, deviceScaleFactor: 2 });
  await context.grantPermissions(['clipboard-read', 'clipboard-write']);
  const page = await context.newPage();
  page.setDefaultTimeout(PATIENCE_MS);
  await page.goto(url);
  await page.locator('.monaco-workbench').waitFor();
  await page.locator('.explorer-folders-view .monaco-list-row').first().waitFor();
  return { page, close: () => browser.close() };
}

/** Opens a file by double-click in the explorer (quick open wants a search binary that is not there). */
export async function openFile(page, name) {
  await page.locator('.explorer-folders-view .monaco-list-row', { hasText: name }).first().dblclick();
  await page.locator('.tab.active', { hasText: name }).waitFor();
  await page.locator('.editor-instance .view-line').first().waitFor();
}

/** Runs a command by its name in the command palette, as a person does. */
export async function runCommand(page, name) {
  await page.keyboard.press('F1');
  const input = page.locator('.quick-input-widget input');
  await input.waitFor();
  await input.fill(`>${name}`);
  await page.locator('.quick-input-list .monaco-list-row', { hasText: name }).first().click();
}

/** Puts the cursor on a line and column of the active editor, both from 1. */
export async function goTo(page, line, column) {
  await page.keyboard.press('Control+g');
  const input = page.locator('.quick-input-widget input');
  await input.waitFor();
  await input.fill(`:${line}:${column}`);
  await page.keyboard.press('Enter');
  await page.locator('.statusbar-item', { hasText: `Ln ${line}, Col ${column}` }).waitFor();
}
