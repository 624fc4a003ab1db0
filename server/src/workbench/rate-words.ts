import type { RateVerdict } from './rates.ts';

/** What a channel would be found to have at a rate, in a few words. */
export function verdictText({ errors, warnings, worst }: RateVerdict): string {
  return errors + warnings === 0 ? 'clean' : worst.join(', ');
}
