import type { WindowName } from '../signal/windows.ts';

/** The windows that a rig file may name, of those that can be computed: the ones in use, each with a word on it. */
export const WINDOW_CHOICES = {
  rectangle: 'No window: the narrowest lines, and the highest side lobes.',
  hann: 'Hann: the usual choice.',
  hamming: 'Hamming: a low first side lobe, and others that hardly fall.',
  blackman: 'Blackman: low side lobes.',
  'blackman-harris': 'Blackman-Harris, four terms: very low side lobes.',
  nuttall: 'Nuttall, four terms: the lowest side lobes of that width.',
  'kaiser-bessel-3': 'Kaiser-Bessel, alpha 3: low side lobes beside lines that are not wide.',
  'flat-top': 'Flat top: true levels between the lines, which are wide.',
} as const satisfies Partial<Record<WindowName, string>>;

/** A window that a rig file may name. */
export type WindowChoice = keyof typeof WINDOW_CHOICES;

/** Their names, in the order of the table. */
export const WINDOW_CHOICE_NAMES = Object.keys(WINDOW_CHOICES) as readonly WindowChoice[];

/** The window of a spectrum that names none. */
export const USUAL_WINDOW: WindowChoice = 'hann';
