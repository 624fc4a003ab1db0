import { type Field, type Fields, innerPlace, placeOf } from './fields.ts';
import { magnitudeOf } from './filter-frequencies.ts';
import type { FilterResponse } from './model.ts';
import type { Reader } from './reader.ts';
import { reportValue } from './values.ts';

/** Attenuation at the cutoff: half the power. */
const CUTOFF_DB = 10 * Math.log10(2);

/** Whether the numbers of a response go together; where they don't, that is said. */
export function checkShape(reader: Reader, fields: Fields, response: FilterResponse): boolean {
  const say = (key: string, message: string): false => {
    const field = fields.byKey.get(key);
    if (field) reportValue(reader, field, 'out-of-range', valuePlace(field), message);
    return false;
  };
  switch (response.response) {
    case 'chebyshev':
      return checkRipple(response.rippleDb, response.edge.at, say);
    case 'inverse-chebyshev':
      return checkStopband(response.stopbandDb, response.edge.at, say);
    case 'elliptic':
      if (!checkRipple(response.rippleDb, response.edge.at, say)) return false;
      if (response.stopbandDb <= response.rippleDb) return say('stopband', '`stopband` must be above `ripple`.');
      return checkStopband(response.stopbandDb, response.edge.at, say);
    case 'mask':
    case 'kaiser': {
      const { pass, stop } = response;
      if (pass.value.kind !== stop.value.kind) return true;
      if (magnitudeOf(pass.value) < magnitudeOf(stop.value)) return true;
      return say('stop', 'The stop band must begin above the end of the pass band: `stop` above `pass`.');
    }
    case 'half-band':
      if ('pass' in response && response.pass.value.kind === 'of-rate' && response.pass.value.fraction >= 0.25) {
        return say('pass', 'A half-band filter passes less than a quarter of its input rate: `pass` below `0.25 fs`.');
      }
      return true;
    default:
      return true;
  }
}

type Say = (key: string, message: string) => false;

function checkRipple(rippleDb: number, at: string, say: Say): boolean {
  if (rippleDb <= 0) return say('ripple', '`ripple` must be above 0 dB for this response.');
  if (at !== 'cutoff' || rippleDb < CUTOFF_DB) return true;
  return say('ripple', 'With a `cutoff`, `ripple` must be below 3.0103 dB; with a `pass-edge` it may be more.');
}

function checkStopband(stopbandDb: number, at: string, say: Say): boolean {
  if (at !== 'cutoff' || stopbandDb > CUTOFF_DB) return true;
  return say('stopband', 'With a `cutoff`, `stopband` must be above 3.0103 dB.');
}

function valuePlace(field: Field): { entry: Field['entry']; start: number; end: number } {
  const { entry, node } = field;
  return node.kind === 'scalar' ? innerPlace(entry, node) : placeOf(entry, node);
}
