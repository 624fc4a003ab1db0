import { acceptanceExpired } from './acceptance-expired.ts';
import { acceptanceIdle } from './acceptance-idle.ts';
import { bandDroop } from './band-droop.ts';
import { bandOverNyquist } from './band-over-nyquist.ts';
import { bandpassStraddles } from './bandpass-straddles.ts';
import type { Check, CheckPage, RigFold } from './check.ts';
import { clips } from './clips.ts';
import { clockDrift } from './clock-drift.ts';
import { diskShort } from './disk-short.ts';
import { DOCUMENT_PAGES } from './document/pages.ts';
import { filterShort } from './filter-short.ts';
import { foldHides } from './fold-hides.ts';
import { foldInBand } from './fold-in-band.ts';
import { foldUnlevelled } from './fold-unlevelled.ts';
import { headroomThin } from './headroom-thin.ts';
import { interleaveImage } from './interleave-image.ts';
import { jitterLimited } from './jitter-limited.ts';
import { levelUnplaced } from './level-unplaced.ts';
import { linesTooCoarse } from './lines-too-coarse.ts';
import { linkShort } from './link-short.ts';
import { noFilter } from './no-filter.ts';
import { noiseFolds } from './noise-folds.ts';
import { onNyquist } from './on-nyquist.ts';
import { patternImage } from './pattern-image.ts';
import { phaseMismatch } from './phase-mismatch.ts';
import { practiceUnmet } from './practice-unmet.ts';
import { pulseMissed } from './pulse-missed.ts';
import { rangeWasted } from './range-wasted.ts';
import { rateOverConverter } from './rate-over-converter.ts';
import { rateUnreachable } from './rate-unreachable.ts';
import { ratesConflict } from './rates-conflict.ts';
import { recordTooLong } from './record-too-long.ts';
import { resonanceInBand } from './resonance-in-band.ts';
import { scanSkew } from './scan-skew.ts';
import { scannedRates } from './scanned-rates.ts';
import { settlingShort } from './settling-short.ts';
import { stepTooCoarse } from './step-too-coarse.ts';
import { stepWithoutFilter } from './step-without-filter.ts';
import { thinMargin } from './thin-margin.ts';
import { windowLeaks } from './window-leaks.ts';

export type { CheckPage } from './check.ts';

/** The checks of one channel, in the order in which a reference shows them. */
export const CHANNEL_CHECKS: readonly Check<'channel'>[] = [
  rateUnreachable,
  rateOverConverter,
  bandOverNyquist,
  thinMargin,
  bandpassStraddles,
  foldInBand,
  foldUnlevelled,
  filterShort,
  noFilter,
  stepWithoutFilter,
  onNyquist,
  foldHides,
  patternImage,
  interleaveImage,
  noiseFolds,
  bandDroop,
  clips,
  headroomThin,
  rangeWasted,
  stepTooCoarse,
  jitterLimited,
  resonanceInBand,
  levelUnplaced,
  linesTooCoarse,
  windowLeaks,
  pulseMissed,
  practiceUnmet,
];

/** What is asked of a channel that is a pulse train: it is read for its edges, and nothing in it folds or sags. */
export const PULSE_CHECKS: readonly Check<'channel'>[] = [
  rateUnreachable,
  rateOverConverter,
  clips,
  headroomThin,
  rangeWasted,
  pulseMissed,
];

/** The checks over many channels. */
export const RIG_CHECKS: readonly Check<'rig'>[] = [
  ratesConflict,
  scanSkew,
  settlingShort,
  phaseMismatch,
  clockDrift,
  recordTooLong,
  diskShort,
  linkShort,
];

/** Everything that is folded over many channels: those checks, and what a check of one channel says of several. */
export const RIG_FOLDS: readonly RigFold[] = [...RIG_CHECKS, scannedRates];

/** Every check, as its reference page shows it. */
export const ALL_CHECKS: readonly CheckPage[] = [
  ...RIG_CHECKS,
  ...CHANNEL_CHECKS,
  ...DOCUMENT_PAGES,
  acceptanceExpired,
  acceptanceIdle,
];

/** What may stand in `checks`. */
export const CHECK_NAMES: readonly string[] = ALL_CHECKS.map(({ name }) => name);
