/** Names of elements that are not closed in their turn, or `undefined`: what a reader of XML would stumble on first. */
export function malformed(xml: string): string | undefined {
  const open: string[] = [];
  const rest = xml.replaceAll(
    /<(\/?)([a-zA-Z]+)((?:\s[\w:-]+="[^"<&]*(?:&(?:amp|lt|gt|quot);[^"<&]*)*")*)\s*(\/?)>/g,
    (_tag, close: string, name: string, _attributes: string, self: string) => {
      if (close && open.pop() !== name) open.push(`!${name}`);
      else if (!close && !self) open.push(name);
      return '';
    },
  );
  if (/[<>]|&(?!(?:amp|lt|gt|quot);)/.test(rest)) return rest.slice(0, 80);
  return open.length > 0 ? open.join(' ') : undefined;
}
