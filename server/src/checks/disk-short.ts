import { triggeredRecords } from '../chain/run-storage.ts';
import { formatQuantity } from '../quantity/write.ts';
import { type Check, SAYS_NOTHING } from './check.ts';
import { bytesText, channelsText, storageOf } from './rig-storage.ts';

/** Relative. */
const ROUNDING = 1e-9;

export const diskShort: Check<'rig'> = {
  name: 'disk-short',
  kind: 'rig',
  severity: 'error',
  finds: 'What the run records does not fit on `disk`.',
  why: 'A disk that is full ends the recording, often at the end of a long test and with nobody there. What each channel keeps counts: the samples of its last stage, in the size that a sample takes, for the whole duration or for all triggered records.',
  shows: `rig: Fan bearing
run: { duration: 8 h, disk: 2 GB }
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
run: { duration: 8 h, disk: 2.22 GB }
digitizers:
  front-end: { bits: 24 }
channels:
  # 25600 samples a second of 3 bytes each: 2.21184 GB in 8 h.
  bearing:
    digitizer: front-end
    rate: 25.6 kHz
    band: 10 Hz .. 5 kHz
    undeclared: -80 dBFS
`,
  sources: ['Arithmetic: rate x bits / 8 x time, summed over the channels. 1 kB is 1000 B.'],
  run: (rig) => {
    const { run } = rig.environment;
    const disk = run?.diskBytes;
    if (!run || !disk) return SAYS_NOTHING;
    const storage = storageOf(rig, run);
    const { bytes } = storage;
    if (bytes === undefined || bytes <= disk.value * (1 + ROUNDING)) return SAYS_NOTHING;
    const triggered = triggeredRecords(run);
    const part = disk.value / bytes;
    const full = triggered
      ? `after ${Math.floor(part * triggered.records)} of ${triggered.records} records`
      : `after ${formatQuantity(part * (run.durationS?.value ?? 0), 'time', 3)} of ${formatQuantity(run.durationS?.value ?? 0, 'time', 3)}`;
    return [
      {
        thing: 'run/disk',
        message: `The disk will be full ${full}: ${channelsText(storage)} make ${bytesText(bytes)}, and there is room for ${bytesText(disk.value)}.`,
        place: disk.place,
        related: [],
        figures: { bytes, diskBytes: disk.value, bytesPerSecond: storage.bytesPerSecond },
        excess: bytes / disk.value,
      },
    ];
  },
};
