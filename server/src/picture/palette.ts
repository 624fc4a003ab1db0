/** The kinds of theme a picture is drawn for; `neutral` brings a background that reads well on any other. */
export type PictureTheme = 'light' | 'dark' | 'high-contrast' | 'high-contrast-light' | 'neutral';

/** The few colours of a picture. Shapes tell what is what; colours only repeat it. */
export interface Palette {
  /** `none` where the picture stands on the editor's own background. */
  readonly background: string;
  /** Around labels, so that they stay legible where they cross a line: the editor's background, as near as it is known. */
  readonly halo: string;
  readonly ink: string;
  readonly quiet: string;
  readonly grid: string;
  readonly band: string;
  readonly bandEdge: string;
  readonly native: string;
  readonly spoils: string;
  /** How much is left, of 1, of a fold line that has faded: a trace of where it goes on. */
  readonly faintest: number;
}

const LIGHT: Palette = {
  background: 'none',
  halo: '#ffffff',
  ink: '#24292e',
  quiet: '#5a646e',
  grid: '#d5dade',
  band: '#dfeaf2',
  bandEdge: '#7c99ad',
  native: '#1f5f8b',
  spoils: '#b3261e',
  faintest: 0.1,
};

const PALETTES: Readonly<Record<PictureTheme, Palette>> = {
  light: LIGHT,
  neutral: { ...LIGHT, background: '#fcfcfb' },
  dark: {
    background: 'none',
    halo: '#1f1f1f',
    ink: '#e4e6e8',
    quiet: '#a3abb3',
    grid: '#3c4248',
    band: '#26394a',
    bandEdge: '#5f86a3',
    native: '#86c0ea',
    spoils: '#ff8a75',
    faintest: 0.12,
  },
  'high-contrast': {
    background: 'none',
    halo: '#000000',
    ink: '#ffffff',
    quiet: '#ffffff',
    grid: '#6f6f6f',
    band: '#10324a',
    bandEdge: '#ffffff',
    native: '#7fd4ff',
    spoils: '#ffb000',
    faintest: 0.28,
  },
  'high-contrast-light': {
    background: 'none',
    halo: '#ffffff',
    ink: '#000000',
    quiet: '#000000',
    grid: '#8a8a8a',
    band: '#d6e8f5',
    bandEdge: '#000000',
    native: '#00407a',
    spoils: '#9c0000',
    faintest: 0.25,
  },
};

export function paletteFor(theme: PictureTheme): Palette {
  return PALETTES[theme];
}
