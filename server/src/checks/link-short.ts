import { triggeredRecords } from '../chain/run-storage.ts';
import { formatQuantity } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { channelsText, rateText, storageOf } from './rig-storage.ts';

/** Relative. */
const ROUNDING = 1e-9;

export const linkShort: Check<'rig'> = {
  name: 'link-short',
  kind: 'rig',
  severity: 'error',
  finds: 'The data arises faster than `link` can carry it away.',
  why: 'A link that falls behind fills whatever buffer there is, and from then on samples are lost, on all channels. Triggered records can wait in a buffer between one trigger and the next: of them it is said where even the whole duration of the run is too short for all of them.',
  shows: `rig: Fan bearing
run: { link: 76 kB/s }
digitizers:
  front-end: { bits: 24 }
channels:
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    undeclared: -80 dBFS
`,
  clean: `rig: Fan bearing
run: { link: 76.8 kB/s }
digitizers:
  front-end: { bits: 24 }
channels:
  # 25600 samples a second of 3 bytes each: 76.8 kB/s.
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    undeclared: -80 dBFS
`,
  sources: ['Arithmetic: rate x bits / 8, summed over the channels. 1 kB is 1000 B.'],
  run: (rig) => {
    const { run } = rig.environment;
    const link = run?.linkBytesPerSecond;
    if (!run || !link) return SAYS_NOTHING;
    const storage = storageOf(rig, run);
    const triggered = triggeredRecords(run);
    const { bytes, bytesPerSecond } = storage;
    const durationS = run.durationS?.value;
    if (triggered && (bytes === undefined || durationS === undefined)) return SAYS_NOTHING;
    const neededBytesPerSecond = triggered ? (bytes ?? 0) / (durationS ?? 1) : bytesPerSecond;
    if (neededBytesPerSecond <= link.value * (1 + ROUNDING)) return SAYS_NOTHING;
    const over = triggered
      ? `: ${triggered.records} records in ${formatQuantity(durationS ?? 0, 'time', 3)} make ${rateText(neededBytesPerSecond)}`
      : `: ${channelsText(storage)} make ${rateText(neededBytesPerSecond)}`;
    return [
      {
        thing: 'run/link',
        message: `The link will fall behind and samples will be lost${over}, and it carries ${rateText(link.value)}.`,
        place: link.place,
        related: [],
        figures: { neededBytesPerSecond, linkBytesPerSecond: link.value, bytesPerSecond },
        excess: neededBytesPerSecond / link.value,
      },
    ];
  },
};
