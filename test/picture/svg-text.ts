import type { Box } from '../../server/src/picture/label-places.ts';
import { textWidth } from '../../server/src/picture/label-places.ts';

/** A text of a picture and the box that it takes, from what is written in the SVG alone. */
export interface DrawnText {
  readonly text: string;
  readonly box: Box;
}

const ENTITIES: Readonly<Record<string, string>> = { '&amp;': '&', '&lt;': '<', '&gt;': '>', '&quot;': '"' };

/** Every text of a picture of ours, in document order. Heights are of capitals and descenders in a plain face. */
export function drawnTexts(svg: string): readonly DrawnText[] {
  const groupSize = /<g font-size="([\d.]+)"/;
  return svg.split(/(?=<g )|(?<=<\/g>)/).flatMap((part) => {
    const size = Number(groupSize.exec(part)?.[1] ?? 11);
    return [...part.matchAll(/<text([^>]*)>([^<]*)<\/text>/g)].map(([, attributes, content]) => {
      const text = content!.replaceAll(/&\w+;/g, (entity) => ENTITIES[entity] ?? entity);
      const of = (name: string): string | undefined => new RegExp(` ${name}="([^"]*)"`).exec(attributes!)?.[1];
      const x = Number(of('x'));
      const y = Number(of('y'));
      const width = textWidth(text, size);
      const anchor = of('text-anchor');
      const left = anchor === 'end' ? x - width : anchor === 'middle' ? x - width / 2 : x;
      return { text, box: { left, right: left + width, top: y - 0.74 * size, bottom: y + 0.22 * size } };
    });
  });
}

/** Width and height of a picture as its view box says. */
export function viewBoxOf(svg: string): { readonly width: number; readonly height: number } {
  const [, width, height] = /viewBox="0 0 ([\d.]+) ([\d.]+)"/.exec(svg)!;
  return { width: Number(width), height: Number(height) };
}

/** What is wrong with the texts of a picture: those cut by its edge, and pairs that lie on one another. */
export function faultsOfTexts(svg: string): readonly string[] {
  const texts = drawnTexts(svg);
  const { width, height } = viewBoxOf(svg);
  const cut = texts.filter(({ box }) => box.left < 0 || box.right > width || box.top < 0 || box.bottom > height);
  const pairs = texts.flatMap((one, index) =>
    texts.slice(index + 1).flatMap((other) => (isOn(one.box, other.box) ? [`${one.text} on ${other.text}`] : [])),
  );
  return [...cut.map(({ text }) => `${text} is cut`), ...pairs];
}

/** Half a pixel is not seen, and coordinates are written to a tenth. */
function isOn(a: Box, b: Box): boolean {
  return a.left + 0.5 < b.right && b.left + 0.5 < a.right && a.top + 0.5 < b.bottom && b.top + 0.5 < a.bottom;
}
