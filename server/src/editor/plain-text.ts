/** Markdown of ours as plain text, for clients that show nothing else: pictures go, tables keep their columns. */
export function plainTextOf(markdown: string): string {
  return markdown
    .replaceAll(/!\[((?:[^\]\\]|\\.)*)\]\([^)]*\)/g, (_picture, alternative: string) =>
      alternative.replaceAll(/\\(.)/g, '$1'),
    )
    .replaceAll(/\[([^\]\n]*)\]\([^)\n]*\)/g, '$1')
    .replaceAll(/^\|(?:---\|)+$\n?/gm, '')
    .replaceAll(/^\| (.*) \|$/gm, (_line, cells: string) => cells.split(' | ').join('   ').replaceAll('\\|', '|'))
    .replaceAll(/^```\w*$\n?/gm, '')
    .replaceAll('**', '')
    .replaceAll('`', '')
    .trim();
}
