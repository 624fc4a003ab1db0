import { describe, expect, it } from 'vitest';
import { EXTRACT_FAN } from '../tools/samples.ts';
import { ran } from './ran.ts';
import { CLEAN, FOLDS, WARNS } from './rigs.ts';

interface MapJson {
  readonly file: string;
  readonly channel: string;
  readonly arrivals: readonly {
    readonly source: string;
    readonly component: string;
    readonly trueHz: readonly [number, number];
    readonly recordedHz: readonly [number, number];
    readonly levelDbfs: number;
    readonly attenuationDb: number;
    readonly folded: boolean;
    readonly overLimit: boolean;
  }[];
  readonly findings: readonly string[];
}

const FAN = { 'fan.rig.yaml': EXTRACT_FAN };

describe('map --format json', () => {
  it('has the figures of the extract fan that are worked out by hand', async () => {
    const argv = ['map', '--format', 'json', 'fan.rig.yaml', 'bearing-drive-end'];
    const { code, stdout, stderr } = await ran(argv, FAN);
    expect([code, stderr]).toEqual([0, '']);
    const map = JSON.parse(stdout) as MapJson;
    expect(map).toMatchObject({
      version: 1,
      file: 'fan.rig.yaml',
      channel: 'bearing-drive-end',
      stages: [{ rateHz: 25_600, nyquistHz: 12_800 }],
      bandHz: [10, 10_000],
      margin: 1.28,
      foldLimitDbfs: -80,
      findings: ['fold-in-band', 'band-droop', 'resonance-in-band'],
    });
    const carrier = map.arrivals.find(({ source, component }) => source === 'inverter' && component === 'carrier')!;
    // 25.6 kHz - 16 kHz = 9.6 kHz. A Butterworth filter of order 6 at 8 kHz: 10 log10(1 + (16/8)^12) = 36.12 dB.
    // 400 mV of ±10 V: 20 log10(0.4 / 10) = -27.96 dBFS, which leaves -64.08 dBFS.
    expect(carrier).toEqual({
      source: 'inverter',
      component: 'carrier',
      trueHz: [16_000, 16_000],
      recordedHz: [9_600, 9_600],
      levelDbfs: expect.closeTo(20 * Math.log10(0.4 / 10) - 10 * Math.log10(1 + 2 ** 12), 6) as number,
      attenuationDb: expect.closeTo(10 * Math.log10(1 + 2 ** 12), 6) as number,
      folded: true,
      foldsAtStage: 1,
      mirrored: true,
      inBand: true,
      overLimit: true,
    });
    expect(carrier.attenuationDb).toBeCloseTo(36.12, 2);
    expect(carrier.levelDbfs).toBeCloseTo(-64.08, 2);
    expect(map.arrivals.map(({ component }) => component)).toEqual(
      expect.arrayContaining(['fundamental', 'harmonic 4', 'sideband +2', 'sideband -1']),
    );
    // 9 x 600 rpm = 90 Hz, 9 x 3000 rpm = 450 Hz; neither folds.
    expect(map.arrivals.find(({ source }) => source === 'blade-pass')).toMatchObject({
      trueHz: [90, 450],
      recordedHz: [90, 450],
      folded: false,
      foldsAtStage: null,
      mirrored: false,
      overLimit: false,
    });
  });

  it('names each check once, the gravest first', async () => {
    const twice = EXTRACT_FAN.replace('  inverter:', '  other: { frequency: 17 kHz, level: 1 V }\n  inverter:');
    const { stdout } = await ran(['map', '--format', 'json', 'fan.rig.yaml'], { 'fan.rig.yaml': twice });
    const { findings } = JSON.parse(stdout) as MapJson;
    expect(findings[0]).toBe('fold-in-band');
    expect(new Set(findings).size).toBe(findings.length);
  });
});

describe('map --format text', () => {
  it('draws the map and lists what arrives, what spoils the band first', async () => {
    const { code, stdout } = await ran(['map', 'fan.rig.yaml'], FAN);
    expect(code).toBe(0);
    expect(stdout).toMatch(/^Alias map of bearing-drive-end {3}record 25\.6 kHz, band 10 Hz \.\. 10 kHz\n/);
    const table = stdout.slice(stdout.indexOf('\nsource ')).trim().split('\n');
    expect(table[0]).toMatch(/^source +component +true +recorded +dBFS$/);
    expect(table[1]).toMatch(/^inverter +carrier +16 kHz +9\.6 kHz +-64\.1 {2}folds at stage 1, over the limit$/);
    const isOver = table.slice(1).map((line) => line.endsWith('over the limit'));
    expect(isOver.indexOf(false)).toBe(5);
    expect(isOver.lastIndexOf(true)).toBe(4);
  });

  it('--ascii draws with no other characters', async () => {
    const { stdout } = await ran(['map', '--ascii', 'fan.rig.yaml'], FAN);
    expect(stdout).toMatch(/^[\n -~]+$/);
    expect((await ran(['map', 'fan.rig.yaml'], FAN)).stdout).toMatch(/[^\n -~]/);
  });
});

describe('map --format svg', () => {
  it('is one picture that stands alone, in the colours of the theme', async () => {
    const pictures = await Promise.all(
      ['neutral', 'light', 'dark', 'high-contrast', 'high-contrast-light'].map(async (theme) => {
        const { code, stdout } = await ran(['map', '--format', 'svg', '--theme', theme, 'fan.rig.yaml'], FAN);
        expect(code).toBe(0);
        expect(stdout).toMatch(/^<svg [^>]*xmlns="http:\/\/www\.w3\.org\/2000\/svg"[\s\S]*<\/svg>\n$/);
        expect(stdout.match(/<svg/g)).toHaveLength(1);
        expect(stdout).not.toMatch(/<script|(?:href|src)=/);
        return stdout;
      }),
    );
    expect(new Set(pictures).size).toBe(5);
    expect((await ran(['map', '--format', 'svg', 'fan.rig.yaml'], FAN)).stdout).toBe(pictures[0]);
  });

  it('goes to the file of --output', async () => {
    const { stdout, files } = await ran(['map', '--format', 'svg', '-o', 'map.svg', 'fan.rig.yaml'], FAN);
    expect(stdout).toBe('');
    expect(files['map.svg']).toMatch(/^<svg [\s\S]*<\/svg>\n$/);
  });
});

describe('the channel that is drawn', () => {
  it('is the one with the gravest findings where none is named', async () => {
    const channelOf = (text: string, name: string): string =>
      text.slice(text.indexOf('channels:\n') + 'channels:\n'.length).replace('  a:', `  ${name}:`);
    const files = { 'a.rig.yaml': CLEAN + channelOf(WARNS, 'b') + channelOf(FOLDS, 'c') };
    const chosen = JSON.parse((await ran(['map', '--format', 'json', 'a.rig.yaml'], files)).stdout) as MapJson;
    expect(chosen).toMatchObject({ channel: 'c', findings: ['fold-in-band'] });
    const named = JSON.parse((await ran(['map', '--format', 'json', 'a.rig.yaml', 'b'], files)).stdout) as MapJson;
    expect(named).toMatchObject({ channel: 'b', findings: ['filter-short'] });
  });

  it('has to be there: the nearest is named', async () => {
    for (const command of ['map', 'rates']) {
      expect(await ran([command, 'fan.rig.yaml', 'bearing-drive-ent'], FAN)).toMatchObject({
        code: 2,
        stdout: '',
        stderr: "ratewright: fan.rig.yaml has no channel 'bearing-drive-ent'; the nearest is 'bearing-drive-end'\n",
      });
    }
    const far = await ran(['map', 'fan.rig.yaml', 'xyzzy'], FAN);
    expect(far.stderr).toBe("ratewright: fan.rig.yaml has no channel 'xyzzy'\n");
  });

  it('has to have a rate and a band: what is missing is said', async () => {
    const files = { 'a.rig.yaml': FOLDS.replace('    band: 10 Hz .. 4 kHz\n', '') };
    const named = await ran(['map', 'a.rig.yaml', 'a'], files);
    expect([named.code, named.stdout]).toEqual([2, '']);
    expect(named.stderr).toMatch(/^ratewright: a can't be drawn: .*`band`/);
    const chosen = await ran(['map', 'a.rig.yaml'], files);
    expect([chosen.code, chosen.stderr]).toEqual([2, 'ratewright: a.rig.yaml has no channel that can be drawn\n']);
  });

  it('may have checks switched off that would have told what is missing', async () => {
    const files = { 'a.rig.yaml': `${FOLDS.replace('    band: 10 Hz .. 4 kHz\n', '')}checks: { missing-key: off }\n` };
    const { code, stderr } = await ran(['map', 'a.rig.yaml', 'a'], files);
    expect([code, stderr]).toEqual([2, "ratewright: a can't be drawn: its rate or its band is missing\n"]);
  });
});

it('a name that would speak to the terminal is shown, not obeyed', async () => {
  const text = FOLDS.replace('  hum:', '  "h\\e]0;x\\a":').replace('  a:', '  "a\\e[2J\\n":');
  const files = { 'a.rig.yaml': text };
  const printed = await Promise.all([
    ran(['map', 'a.rig.yaml'], files),
    ran(['check', '--remedies'], files),
    ran(['rates', 'a.rig.yaml', 'a\u001b[2J\n'], files),
    ran(['map', 'a.rig.yaml', 'a\u001b[2'], files),
    ran(['fix'], files),
  ]);
  const said = [
    ...printed.map(({ stdout }) => stdout),
    printed[1].stderr,
    printed[3].stderr.split(';')[1],
    printed[4].stderr,
  ];
  for (const text of said) expect(text?.replaceAll('\n', '')).not.toMatch(/\p{Cc}/u);
  expect(printed[1].stdout).toContain('(a\\u001b[2J\\u000a)');
  expect(printed[2].stdout).toMatch(/^a\\u001b\[2J\\u000a\n/);
  expect(printed[3].stderr).toContain("'a\\u001b[2J\\u000a'");
});
