/** Generated rigs of any size: what the benchmarks and the memory test read. Invented, and of no interest otherwise. */

export type RigStyle = 'block' | 'flow' | 'json';

const HEAD = `rig: Generated rig
mains: { frequency: 50 Hz, harmonics: 10, level: 5 mV, falls: 6 dB/oct }

clocks:
  chassis: { frequency: 13.1072 MHz, divide: 1..128, tolerance: 25 ppm }

digitizers:
  front-end: { clock: chassis, prescale: 256, bits: 24, full-scale: ±10 V, noise: 20 uV, jitter: 200 ps }

sensors:
  stud: { measures: acceleration, sensitivity: 100 mV/g, resonance: 32 kHz, range: 100 g, noise: 1 mm/s2/rtHz }

filters:
  card: { response: butterworth, order: 8, cutoff: 9.5 kHz }
  tidy: { response: butterworth, order: 8, cutoff: 0.18 fs }

groups:
  shaft: { within: 5 deg, up-to: 2 kHz }

sources:
  blade-pass: { order: 9, speed: 600..3000 rpm, harmonics: 8, level: 1 g, falls: 6 dB/oct, wanted: true }
  inverter: { carrier: 16 kHz, modulation: 50 Hz, sidebands: 2, harmonics: 3, level: 40 mV, falls: 6 dB/oct, sidebands-fall: 6 dB }
  gear-mesh: { order: 31, speed: 600..3000 rpm, harmonics: 6, level: 0.5 g, falls: 9 dB/oct }
`;

const RATES = ['25.6 kHz', '51.2 kHz', '25.6 kHz', '51.2 kHz', '10.24 kHz'];

/** The ten keys of one channel, varied a little from one to the next so that nothing is the same by accident. */
function channelKeys(index: number): readonly (readonly [key: string, value: string])[] {
  const rate = RATES[index % RATES.length]!;
  const band = rate === '51.2 kHz' ? 5000 + (index % 7) * 100 : 2000 + (index % 7) * 100;
  return [
    ['sensor', 'stud'],
    ['digitizer', 'front-end'],
    ['rate', rate],
    ['filter', 'card'],
    ['band', `5 Hz .. ${band} Hz`],
    ['fold-limit', `-${60 + (index % 5)} dBFS`],
    ['flatness', `${1 + (index % 3) * 0.5} dB`],
    ['peak', `${20 + (index % 11)} g`],
    // One channel in eight is compared with others: as many as a large rig would have.
    index % 8 === 0 ? ['group', 'shaft'] : ['headroom', '3 dB'],
    ['note', `position ${index}`],
  ];
}

/** A rig of `channels` channels; about 250 characters a channel. */
export function generatedRig(channels: number, style: RigStyle): string {
  const names = Array.from({ length: channels }, (_, index) => `channel-${index}`);
  if (style === 'block') {
    const blocks = names.map((name, index) => {
      const keys = channelKeys(index).map(([key, value]) => `    ${key}: ${value}`);
      return `  ${name}:\n${keys.join('\n')}\n`;
    });
    return `${HEAD}\nchannels:\n${blocks.join('')}`;
  }
  if (style === 'flow') {
    const lines = names.map((name, index) => {
      const keys = channelKeys(index).map(([key, value]) => `${key}: ${value}`);
      return `  ${name}: { ${keys.join(', ')} }`;
    });
    return `{ rig: Generated rig,\n${flowHead()},\nchannels: {\n${lines.join(',\n')}\n} }\n`;
  }
  const lines = names.map((name, index) => {
    const keys = channelKeys(index).map(([key, value]) => `${JSON.stringify(key)}: ${JSON.stringify(value)}`);
    return `    ${JSON.stringify(name)}: { ${keys.join(', ')} }`;
  });
  return `{\n  "rig": "Generated rig",\n${jsonHead()},\n  "channels": {\n${lines.join(',\n')}\n  }\n}\n`;
}

/** The named things of {@link HEAD} in flow style: every section's entries already are flow maps. */
function flowHead(): string {
  const sections: string[] = [];
  let open = false;
  for (const line of HEAD.split('\n').slice(1)) {
    if (line === '') continue;
    if (line.startsWith('  ')) {
      sections.push(`${open ? ', ' : ''}${line.trim()}`);
      open = true;
    } else if (line.endsWith(':')) {
      if (open) sections.push('}, ');
      sections.push(`${line} { `);
      open = false;
    } else sections.push(`${line}, `);
  }
  return `${sections.join('')} }`;
}

function jsonHead(): string {
  return flowHead()
    .replace(/([A-Za-z][\w-]*): /g, '"$1": ')
    .replace(/": ([^{}",]+?)(?=\s*[,}])/g, '": "$1"');
}
