import { describe, expect, it } from 'vitest';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { ran } from './ran.ts';
import { FOLDS } from './rigs.ts';

describe('rates', () => {
  it('lists the rates that the digitizer has, each with its margin and its verdict, with a mark at the present one', async () => {
    const { code, stdout, stderr } = await ran(['rates', 'a.rig.yaml', 'a'], { 'a.rig.yaml': FOLDS });
    expect([code, stderr]).toEqual([0, '']);
    // Margin: half the rate over the top of the band at 4 kHz.
    expect(stdout).toBe(
      [
        'a',
        '',
        '    rate  margin  verdict',
        '> 20 kHz    2.50  fold-in-band',
        '  25 kHz    3.13  filter-short',
        '  40 kHz    5.00  clean',
        '',
      ].join('\n'),
    );
  });

  it('lists what the clock and its dividers make: 13.1072 MHz / (256 n)', async () => {
    const { stdout } = await ran(['rates', 'fan.rig.yaml', 'bearing-drive-end'], { 'fan.rig.yaml': EXTRACT_FAN });
    const rates = [...stdout.matchAll(/^[> ] +([\d.]+) kHz /gm)].map(([, rate]) => Number(rate));
    expect(rates).toEqual([25.6, 51.2]);
    for (const rate of rates) expect((13_107.2 / 256 / rate) % 1).toBe(0);
  });

  it('has the rates of a channel whose own is still to be written', async () => {
    const files = { 'a.rig.yaml': FOLDS.replace('    rate: 20 kHz      # as wired\n', '') };
    const { code, stdout } = await ran(['rates', 'a.rig.yaml', 'a'], files);
    expect(code).toBe(0);
    expect(stdout).not.toContain('>');
    expect(stdout).toContain('40 kHz');
  });

  it('of a channel without a band are none: that is said', async () => {
    const files = { 'a.rig.yaml': FOLDS.replace('    band: 10 Hz .. 4 kHz\n', '') };
    expect(await ran(['rates', 'a.rig.yaml', 'a'], files)).toMatchObject({
      code: 2,
      stdout: '',
      stderr: 'ratewright: a has no band to choose a rate for, or no rate can be made for it\n',
    });
  });

  it('are coloured by what would be found', async () => {
    const files = { 'a.rig.yaml': FOLDS };
    const { stdout } = await ran(['rates', 'a.rig.yaml', 'a', '--color', 'always'], files);
    expect(stdout).toContain('\u001b[31mfold-in-band\u001b[39m');
    expect(stdout).toContain('\u001b[33mfilter-short\u001b[39m');
    expect(stdout).toContain('\u001b[1mclean\u001b[22m');
  });

  it('go to the file of --output', async () => {
    const { stdout, files } = await ran(['rates', 'a.rig.yaml', 'a', '-o', 'out.txt'], { 'a.rig.yaml': FOLDS });
    expect([stdout, files['out.txt']?.split('\n')[0]]).toEqual(['', 'a']);
  });
});
