import { formatHz } from '../quantity/write.ts';
import { foldMapSvg } from './alias-map-fold-svg.ts';
import type { MapLayout, MapSize } from './alias-map-layout.ts';
import { layOut } from './alias-map-layout.ts';
import type { AliasMap } from './alias-map-model.ts';
import { spectrumSvg } from './alias-map-spectrum-svg.ts';
import { textWidth } from './label-places.ts';
import { legend } from './marks-svg.ts';
import type { Palette, PictureTheme } from './palette.ts';
import { paletteFor } from './palette.ts';
import { element, escaped } from './svg.ts';
import { FONT, SMALL, text } from './text-svg.ts';

export interface AliasMapSvgOptions {
  readonly theme: PictureTheme;
  /** `large` where it is left out. */
  readonly size?: MapSize;
  /** Past this many bytes marks are left out, the lightest first. */
  readonly maxBytes?: number;
}

const MAX_BYTES = 30_000;

/** The alias map as SVG: the same text for the same map. */
export function aliasMapSvg(map: AliasMap, options: AliasMapSvgOptions): string {
  const layout = layOut(map, options.size ?? 'large');
  const palette = paletteFor(options.theme);
  for (let most = map.marks.length; ; most = Math.floor(most / 2)) {
    const leftOut = map.leftOut + map.marks.length - most;
    const svg = drawn({ ...map, marks: map.marks.slice(0, most), leftOut }, layout, palette);
    if (most === 0 || new TextEncoder().encode(svg).length <= (options.maxBytes ?? MAX_BYTES)) return svg;
  }
}

function drawn(map: AliasMap, layout: MapLayout, palette: Palette): string {
  const { width, height } = layout;
  const content = [
    `<title>${escaped(map.title)}</title><desc>${escaped(map.description)}</desc>`,
    palette.background === 'none' ? '' : element('rect', { width, height, rx: 4, fill: palette.background }),
    head(map, layout, palette),
    foldMapSvg(map, layout, palette),
    between(map, layout, palette),
    spectrumSvg(map, layout, palette),
  ];
  return element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      width,
      height,
      viewBox: `0 0 ${width} ${height}`,
      role: 'img',
      'font-family': FONT,
      'font-size': SMALL,
    },
    content.join(''),
  );
}

/** The name of the upright axis and what the shapes mean. */
function head(map: AliasMap, { width, margin, headBaseline, nameDrop }: MapLayout, palette: Palette): string {
  const kinds = new Set(map.marks.map(({ kind }) => kind));
  const { drawn, left } = legend(kinds, width - margin.right, headBaseline, palette);
  const [x, names] = nameDrop === undefined ? [EDGE, NAMES_OF_BOTH] : [margin.left, []];
  const name = names.find((one) => x + textWidth(one, SMALL) <= left) ?? 'recorded';
  return text(x, headBaseline, name, { fill: palette.quiet }) + drawn;
}

/** The names of both axes, where only the head has room for them: the longest that fits. */
const NAMES_OF_BOTH: readonly string[] = [
  'recorded frequency, over the true one at the sensor',
  'recorded, over true frequency',
  'recorded, over true',
];

/** The least distance of words from the picture's edge. */
const EDGE = 6;

/** Between map and spectrum: the name of the axis above, and how the record comes about. */
function between(map: AliasMap, { width, margin, recordedAxis, nameDrop }: MapLayout, palette: Palette): string {
  if (nameDrop === undefined) return '';
  const baseline = recordedAxis.from + nameDrop;
  const right = width - margin.right;
  const name = 'true frequency at the sensor';
  const rates = map.ratesHz.map((rateHz) => formatHz(rateHz, 4));
  const left = [
    `sampled at ${rates.join(', then ')}`,
    ...(map.leftOut > 0 ? [`${map.leftOut} marks left out`] : []),
  ].join('; ');
  const fits = margin.left + textWidth(left, SMALL) + 12 < right - textWidth(name, SMALL);
  return (
    text(right, baseline, name, { fill: palette.quiet, 'text-anchor': 'end' }) +
    (fits ? text(margin.left, baseline, left, { fill: palette.quiet }) : '')
  );
}
