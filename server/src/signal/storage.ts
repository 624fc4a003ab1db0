/** How much room samples take, and how fast they have to be carried away. 1 kB is 1000 B; one byte is 8 bits. */

const BITS_PER_BYTE = 8;

/** Counts this close to the next whole number, relative to it, are that number but for rounding. */
const ROUNDING = 1e-12;

/** What one channel keeps. */
export interface StoredStream {
  /** Samples kept each second: after all decimation, and only those that a pattern takes. */
  readonly keptRateHz: number;
  readonly sampleBits: number;
}

/**
 * Room for one sample where nothing else is said: the converter's bits rounded up to whole bytes, 8, 16, 24 or 32 bits,
 * and so on for what has more. Common practice; no source.
 *
 * @param converterBits above 0; 8 bits where it is not
 */
export function defaultSampleBits(converterBits: number): number {
  return BITS_PER_BYTE * Math.max(1, Math.ceil(converterBits / BITS_PER_BYTE) || 1);
}

/** Bytes a second of one channel; with fewer than 8 bits a sample, samples are packed. */
export function streamBytesPerSecond({ keptRateHz, sampleBits }: StoredStream): number {
  return (keptRateHz * sampleBits) / BITS_PER_BYTE;
}

/** Bytes a second of all channels together: what a link has to carry. */
export function bytesPerSecond(streams: readonly StoredStream[]): number {
  return streams.reduce((sum, stream) => sum + streamBytesPerSecond(stream), 0);
}

/** Bytes of all channels recorded without a pause for `durationS`. */
export function bytesOfDuration(streams: readonly StoredStream[], durationS: number): number {
  return bytesPerSecond(streams) * durationS;
}

/** Bytes of `records` triggered records of `recordS` each; every channel keeps the whole samples that one holds. */
export function bytesOfRecords(streams: readonly StoredStream[], records: number, recordS: number): number {
  return streams.reduce(
    (sum, { keptRateHz, sampleBits }) =>
      sum + (records * wholeSamples(keptRateHz * recordS) * sampleBits) / BITS_PER_BYTE,
    0,
  );
}

function wholeSamples(samples: number): number {
  return Math.floor(samples * (1 + ROUNDING));
}
