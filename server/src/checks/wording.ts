import type { Chain } from '../chain/model.ts';
import { findUnit, ownUnit } from '../quantity/unit.ts';
import { formatHz, formatQuantity } from '../quantity/write.ts';
import type { Step } from '../rig/model.ts';
import { ratioOf } from '../signal/decibel.ts';

/** Significant digits of a difference in decibels, and of levels that are not in decibels. */
const DIFFERENCE_DIGITS = 3;

/** A level on a channel's scale, as messages show it. */
export function levelText(level: number, { levelUnit, scale }: Chain): string {
  switch (levelUnit) {
    case 'dbfs':
    case 'relative':
      return formatQuantity(level, 'dbfs');
    case 'db-volt':
      return formatQuantity(ratioOf(level), 'voltage', DIFFERENCE_DIGITS);
    case 'db-measured': {
      const symbol = scale.sensor?.unit;
      if (symbol === undefined) return formatQuantity(ratioOf(level), 'number', DIFFERENCE_DIGITS);
      return formatQuantity(ratioOf(level), findUnit(symbol) ?? ownUnit(symbol), DIFFERENCE_DIGITS);
    }
  }
}

/** How far a level is over the fold limit: `15.9 dB over the fold limit of -80 dBFS`. */
export function overLimitText(level: number, chain: Chain): string {
  const limit = chain.foldLimit;
  return `${differenceText(level - limit)} over the fold limit of ${levelText(limit, chain)}`;
}

/** A level and its limit as figures, under names that tell their scale. */
export function levelFigures(level: number, chain: Chain): Readonly<Record<string, number>> {
  switch (chain.levelUnit) {
    case 'dbfs':
      return { levelDbfs: level, limitDbfs: chain.foldLimit };
    case 'db-volt':
      return { levelDbVolt: level, limitDbVolt: chain.foldLimit };
    case 'db-measured':
      return { levelDbMeasured: level, limitDbMeasured: chain.foldLimit };
    case 'relative':
      return { levelDb: level, limitDb: chain.foldLimit };
  }
}

/** A difference in decibels, to no more than a hundredth: `15.9 dB`, `0.08 dB`. */
export function differenceText(db: number): string {
  if (Math.abs(db) >= 1) return formatQuantity(db, 'decibel', DIFFERENCE_DIGITS);
  return db > 0 && db < 0.005 ? 'less than 0.01 dB' : formatQuantity(db, 'decibel');
}

/** A point or a range of frequency. */
export function hzText(lowHz: number, highHz: number): string {
  const low = formatHz(lowHz);
  const high = formatHz(highHz);
  return low === high ? low : `${low} .. ${high}`;
}

/** A sample rate, in the unit that rates are mostly written in. */
export function rateText(rateHz: number): string {
  return formatHz(rateHz, 7);
}

/** Volts, signed. */
export function voltsText(volts: number): string {
  return formatQuantity(volts, 'voltage', 4);
}

/** `a`, `a and b`, `a, b and c`; past `most`, `and N more`. */
export function listText(items: readonly string[], most = 6): string {
  const shown = items.length > most ? [...items.slice(0, most), `${items.length - most} more`] : items;
  if (shown.length <= 1) return shown.join('');
  return `${shown.slice(0, -1).join(', ')} and ${shown[shown.length - 1]}`;
}

/** 1st, 2nd, 3rd, 4th: which samples a step keeps. */
export function ordinal(number: number): string {
  const tens = number % 100;
  if (tens >= 11 && tens <= 13) return `${number}th`;
  return `${number}${['th', 'st', 'nd', 'rd'][number % 10] ?? 'th'}`;
}

/** What a stage of a chain does, for a sentence that begins `It folds ...`; `''` where there is only one. */
export function stageText({ stages }: Chain, stage: number): string {
  const { kind, rateHz, step } = stages[stage - 1]!;
  switch (kind) {
    case 'converter':
      return stages.length > 1 ? `at the converter (${rateText(rateHz)})` : '';
    case 'modulator':
      return `at the modulator (${rateText(rateHz)})`;
    case 'modulator-decimation':
      return `where the converter decimates to ${rateText(rateHz)}`;
    case 'decimate':
      return `where every ${ordinal(step?.kind === 'decimate' ? step.factor.value : 1)} sample is kept (${rateText(rateHz)})`;
    case 'per-turn':
      return step?.kind === 'per-turn' ? perTurnText(step, rateHz) : '';
  }
}

/** At which speed it is, since that decides the rate. */
function perTurnText({ perTurn }: Extract<Step, { kind: 'per-turn' }>, rateHz: number): string {
  const speedRpm = Number(((60 * rateHz) / perTurn.value).toPrecision(5));
  return `where it is resampled to ${perTurn.value} samples a turn (${rateText(rateHz)} at ${speedRpm} rpm)`;
}
