import type { Run } from '../rig/model.ts';
import { averagesThatFit } from '../signal/spectrum-plan.ts';
import { triggeredRecords } from './run-storage.ts';
import type { ChannelSpectrum } from './spectrum.ts';

/**
 * The most records of a spectrum that a run has room for: in its duration, or, where records are triggered, as many in
 * each of them as fit there, and so many times that. 0 where not even one fits; `undefined` where it is not known how
 * long is recorded.
 */
export function mostAverages({ settings, record }: ChannelSpectrum, run: Run): number | undefined {
  const triggered = triggeredRecords(run);
  const recordedS = triggered ? triggered.recordS : run.durationS?.value;
  if (recordedS === undefined) return undefined;
  return averagesThatFit(record.recordS, settings.overlap, recordedS) * (triggered?.records ?? 1);
}
