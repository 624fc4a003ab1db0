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

const WINDOW = { width: 1280, height: 860 };

/** Opens the browser on the served editor; `close` ends it. */
export async function openBrowser(url) {
  const browser = await playwright.launch({ executablePath: chromium, args: FLAGS });
  const context = await browser.newContext({ viewport: WINDOW, deviceScaleFactor: 2 });
  const page = await context.newPage();
  page.setDefaultTimeout(PATIENCE_MS);
  await page.goto(url);
  await page.locator('.explorer-folders-view .monaco-list-row').first().waitFor();
  return { page, close: () => browser.close() };
}

/** Opens a file by double-click in the explorer (quick open wants a search binary that is not there). */
export async function openFile(page, name) {
  await page.locator('.explorer-folders-view .monaco-list-row', { hasText: name }).dblclick();
  await page.locator('.tab.active', { hasText: name }).waitFor();
  await page.locator('.editor-instance .view-line').first().waitFor();
}

/** Runs a command by its name in the command palette. */
export async function runCommand(page, name) {
  await page.keyboard.press('F1');
  const input = page.locator('.quick-input-widget input[type=text]');
  await input.waitFor();
  await input.fill(`>${name}`);
  await page.locator('.quick-input-list .monaco-list-row', { hasText: name }).first().click();
}

/** Chooses an entry of the list that is open by typing its name. */
export async function chooseByKeys(page, name) {
  const input = page.locator('.quick-input-widget input[type=text]');
  await input.waitFor();
  await input.fill(name);
  await page.locator('.quick-input-list .monaco-list-row.focused', { hasText: name }).waitFor();
  await page.keyboard.press('Enter');
}

/** Puts the cursor on a line and column of the active editor, both from 1. */
export async function goTo(page, { line, column }) {
  await page.keyboard.press('Control+g');
  const input = page.locator('.quick-input-widget input[type=text]');
  await input.waitFor();
  await input.fill(`:${line}:${column}`);
  await page.keyboard.press('Enter');
  await page.locator('.statusbar-item', { hasText: `Ln ${line}, Col ${column}` }).waitFor();
}

/** Replaces, by keys, the rest of a line from a column on. */
export async function retypeFrom(page, place, text) {
  await goTo(page, place);
  await page.keyboard.press('Shift+End');
  await page.keyboard.type(text);
}

/** The squiggly lines of a severity in the active editor: `error`, `warning` or `info`. */
export function squiggles(page, severity) {
  return page.locator(`.editor-group-container.active .squiggly-${severity}`);
}

/** Waits until the active editor shows so many squiggly lines of a severity. */
export async function waitForSquiggles(page, severity, count) {
  await page.waitForFunction(
    ([selector, wanted]) => document.querySelectorAll(selector).length === wanted,
    [`.editor-group-container.active .squiggly-${severity}`, count],
  );
}

/** The text that stands above a squiggly line: the characters whose middle lies within it. */
export async function textOver(squiggle) {
  const box = await boxOf(squiggle);
  return squiggle.page().evaluate(({ x, y, width, height }) => {
    let text = '';
    for (const line of document.querySelectorAll('.editor-group-container.active .view-line')) {
      const { top, bottom } = line.getBoundingClientRect();
      if (top > y + height / 2 || bottom < y + height / 2) continue;
      const walker = document.createTreeWalker(line, NodeFilter.SHOW_TEXT);
      for (let node = walker.nextNode(); node; node = walker.nextNode()) {
        for (let at = 0; at < node.length; at++) {
          const range = document.createRange();
          range.setStart(node, at);
          range.setEnd(node, at + 1);
          const { left, right } = range.getBoundingClientRect();
          if ((left + right) / 2 >= x && (left + right) / 2 <= x + width) text += node.data[at];
        }
      }
    }
    return text.replace(/\u00a0/g, ' ');
  }, box);
}

/** Where something is shown: once more where it is drawn anew just when it is looked for. */
async function boxOf(target) {
  for (let attempt = 0; attempt < 50; attempt++) {
    await target.waitFor({ state: 'attached' });
    const box = await target.boundingBox();
    if (box) return box;
  }
  throw new Error('What is looked for is not shown.');
}

/** Waits until nothing fades in or out any longer. */
export async function settled(page) {
  const isEnding = () =>
    document
      .getAnimations()
      .some(({ playState, effect }) => playState === 'running' && effect.getTiming().iterations !== Infinity);
  await page.waitForFunction(`!(${isEnding})()`);
}

/** Points at a place on the screen and returns the hover that is shown. */
export async function hoverOver(page, target) {
  const box = await boxOf(target);
  await page.mouse.move(box.x - 60, box.y + 60);
  await page.mouse.move(box.x + box.width / 2, box.y + box.height / 2, { steps: 5 });
  const hover = page.locator('.monaco-hover:visible', { has: page.locator('.hover-contents, .hover-row') });
  await hover.first().waitFor();
  return hover.first();
}

/** Moves the mouse to where nothing is, and waits until what the mouse had called up is gone. */
export async function pointAtNothing(page) {
  await page.mouse.move(20, WINDOW.height / 2);
  await page.locator('.workbench-hover').waitFor({ state: 'hidden' });
}

/** Moves the mouse to the middle of what is shown and clicks: menus ignore a click that no movement came before. */
export async function clickByMouse(target) {
  const { x, y, width, height } = await boxOf(target);
  const { mouse } = target.page();
  await mouse.move(x + width / 2, y + height / 2, { steps: 5 });
  await mouse.click(x + width / 2, y + height / 2);
}

/** The contents of the page in the webview of the active editor group. */
export function webview(page) {
  return page.frameLocator('iframe.webview.ready').frameLocator('#active-frame');
}
