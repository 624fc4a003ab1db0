import { expect, it } from 'vitest';
import { windowsText } from '../../server/src/workbench/rate-words.ts';
import { chainOfText } from '../chain/rig.ts';

it('the windows of a band that is folded on purpose are told, and none of any other', () => {
  const rig = (rate: string, sampling: string): string =>
    `rig: R\nchannels:\n  a: { rate: ${rate}, sampling: ${sampling}, band: 20 MHz .. 25 MHz }\n`;
  // 2 fH / n .. 2 fL / (n - 1) for n = 4, 3, 2. Vaughan, Scott and White 1991, by hand.
  expect(windowsText(chainOfText(rig('18 MHz', 'bandpass')))).toBe(
    'The band is whole at 12.5 MHz .. 13.333 MHz (upside down), 16.667 MHz .. 20 MHz, 25 MHz .. 40 MHz (upside down).',
  );
  expect(windowsText(chainOfText(rig('60 MHz', 'baseband')))).toBeUndefined();
});
