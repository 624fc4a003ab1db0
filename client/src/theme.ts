import { ColorThemeKind } from 'vscode';

/** The theme as the server knows it: it picks the colours of its pictures by this. */
export type ThemeName = 'light' | 'dark' | 'high-contrast' | 'high-contrast-light';

export function themeName(kind: ColorThemeKind): ThemeName {
  switch (kind) {
    case ColorThemeKind.Light:
      return 'light';
    case ColorThemeKind.HighContrast:
      return 'high-contrast';
    case ColorThemeKind.HighContrastLight:
      return 'high-contrast-light';
    default:
      return 'dark';
  }
}
