import type { FoldedPiece } from '../signal/folding.ts';

/** The part of a piece that is recorded within a range, along its true frequency from 0 to 1. */
export function landingIn(
  piece: FoldedPiece,
  lowHz: number,
  highHz: number,
): { readonly from: number; readonly to: number } | undefined {
  const { recordedLowHz, recordedHighHz, mirrored } = piece;
  const start = Math.max(recordedLowHz, lowHz);
  const end = Math.min(recordedHighHz, highHz);
  if (start > end) return undefined;
  const width = recordedHighHz - recordedLowHz;
  if (width === 0) return { from: 0, to: 1 };
  return mirrored
    ? { from: (recordedHighHz - end) / width, to: (recordedHighHz - start) / width }
    : { from: (start - recordedLowHz) / width, to: (end - recordedLowHz) / width };
}
