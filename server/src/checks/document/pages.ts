import type { ProblemName } from '../../rig/problem.ts';
import type { CheckPage } from '../check.ts';

const YAML = 'YAML Ain’t Markup Language, version 1.2.2.';
const SI = 'The International System of Units, BIPM brochure.';

function page(
  name: ProblemName,
  severity: CheckPage['severity'],
  finds: string,
  why: string,
  shows: string,
  clean: string,
  sources: readonly string[] = ['The vocabulary of the rig file.'],
): CheckPage & { readonly name: ProblemName } {
  return { name, severity, finds, why, shows, clean, sources };
}

/** The checks of the document itself: what the reader finds, and how grave each is. */
export const DOCUMENT_PAGES: readonly (CheckPage & { readonly name: ProblemName })[] = [
  page(
    'syntax',
    'error',
    'The text is not YAML at this place.',
    "An entry that can't be read is not checked. A slip costs only the entry that it stands in: all others are read and checked as if it were not there.",
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n    note: "above the coupling\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n    note: "above the coupling"\n',
    [YAML],
  ),
  page(
    'unknown-key',
    'warning',
    'A key that does not exist here; the nearest that does is suggested.',
    'A key that is not known is not read. A misspelt `fold-limit` leaves the usual limit in place, and nobody notices.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n    fold-limt: -80 dBFS\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n    fold-limit: -80 dBFS\n',
  ),
  page(
    'unknown-name',
    'error',
    'A name that stands for nothing in this file and those that it uses, or a used file that is not there.',
    'What it should have stood for is missing from the check: a filter that is not found filters nothing, a digitizer that is not found has no full scale. While a file that is used can not be read, other names are not reported: they may be its own.',
    'rig: Fan bearing\nfilters:\n  card: { response: rc, order: 1, corner: 8 kHz }\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 2 kHz\n    filter: crad\n',
    'rig: Fan bearing\nfilters:\n  card: { response: rc, order: 1, corner: 8 kHz }\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 2 kHz\n    filter: card\n',
  ),
  page(
    'duplicate-name',
    'error',
    'Two things of one kind, or two keys of one map, have the same name; a hint where it hides the name of a used file.',
    'Only the first is read. Which of the two was meant is for you to say.',
    'rig: Fan bearing\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 5 kHz }\n  bearing: { rate: 51.2 kHz, band: 10 Hz .. 5 kHz }\n',
    'rig: Fan bearing\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 5 kHz }\n  bearing-2: { rate: 51.2 kHz, band: 10 Hz .. 5 kHz }\n',
    [YAML],
  ),
  page(
    'missing-key',
    'error',
    'A key that has to be there is not.',
    'Without a rate and a band there is nothing to check a channel against, and a filter without its order or corner is no filter.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n',
  ),
  page(
    'wrong-kind',
    'error',
    'A value of the wrong kind: a list where a map is due, a key of another response, nothing at all.',
    'The value is not read, and the rest goes on as if the key were left out.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: [25.6 kHz]\n    band: 10 Hz .. 5 kHz\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n',
  ),
  page(
    'unit-missing',
    'warning',
    'A bare number where a unit is due.',
    'It is read in the base unit of its key, which may not be what was meant: 25.6 is 25.6 Hz.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25600\n    band: 10 Hz .. 5 kHz\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25600 Hz\n    band: 10 Hz .. 5 kHz\n',
    [SI],
  ),
  page(
    'unit-mismatch',
    'error',
    'A unit of the wrong dimension, or one that the channel does not measure in.',
    'Seconds are no frequency, and a limit in g says nothing on a channel that measures strain. The value is not read.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 ms\n    band: 10 Hz .. 5 kHz\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n',
    [SI],
  ),
  page(
    'out-of-range',
    'error',
    "A number that can't be: a negative rate, an order of 0 or over 50, a range upside down, a digital filter whose corner is at or beyond half the rate that it is given.",
    'The value is not read, or the filter does not do what it says. Where it depends on the rate of the channel, it is told at the channel.',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: -25.6 kHz\n    band: 10 Hz .. 5 kHz\n',
    'rig: Fan bearing\nchannels:\n  bearing:\n    rate: 25.6 kHz\n    band: 10 Hz .. 5 kHz\n',
  ),
  page(
    'unused-name',
    'hint',
    'A named thing that nothing names.',
    'It may be left over, or a channel may name another by mistake: a filter that nobody uses filters nothing.',
    'rig: Fan bearing\nfilters:\n  card: { response: rc, order: 1, corner: 8 kHz }\n  tidy: { response: rc, order: 2, corner: 8 kHz }\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz, filter: card }\n',
    'rig: Fan bearing\nfilters:\n  card: { response: rc, order: 1, corner: 8 kHz }\n  tidy: { response: rc, order: 2, corner: 8 kHz }\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz, filter: [card, tidy] }\n',
  ),
  page(
    'too-much',
    'error',
    'A limit is passed: 4 Mi characters, 20,000 channels, depth 64, 10,000 alias expansions, 1,000 harmonics or sidebands, 1,000 items of `accept`, 200 syntax findings.',
    'What lies past a limit is not read. Whole channels before it are checked all the same.',
    'rig: Fan bearing\nsources:\n  drive: { frequency: 50 Hz, harmonics: 1001 }\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz }\n',
    'rig: Fan bearing\nsources:\n  drive: { frequency: 50 Hz, harmonics: 1000 }\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz }\n',
  ),
  page(
    'not-computed',
    'hint',
    'A key that is known and that this version does not compute, once for each key of a file.',
    'Its value is read and checked, and nothing is concluded from it: what it does to the data is not in the findings.',
    'rig: Fan bearing\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz, then: [{ per-turn: 64 }] }\n',
    'rig: Fan bearing\nchannels:\n  bearing: { rate: 25.6 kHz, band: 10 Hz .. 2 kHz }\n',
  ),
];

const PAGE_BY_NAME = new Map(DOCUMENT_PAGES.map((one) => [one.name, one]));

/** How grave a problem of the document is, where the file says nothing else. */
export function documentSeverity(name: ProblemName): CheckPage['severity'] {
  return PAGE_BY_NAME.get(name)?.severity ?? 'error';
}
