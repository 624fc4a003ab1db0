/** The server's answer to `ratewright/map`: the alias map of the channel at a position. */
export interface AliasMap {
  readonly title: string;
  /** The picture, as SVG text in the colours of the theme that the server was told. */
  readonly svg: string;
  /** The same map in characters. */
  readonly text: string;
}

function escapeHtml(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;');
}

function page(body: string): string {
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; img-src data:; style-src 'unsafe-inline'">
<style>
  body { padding: 0 1rem 1rem; }
  h1 { font-size: 1.1rem; font-weight: 600; }
  img { display: block; width: 100%; max-width: 1100px; height: auto; }
  summary { margin-top: 1rem; cursor: pointer; }
  pre { font-family: var(--vscode-editor-font-family), monospace; line-height: 1.25; overflow-x: auto; }
</style>
</head>
<body>
${body}
</body>
</html>`;
}

/** The page that shows an alias map: the picture, and the same in characters for those who can't see it. No scripts. */
export function mapPage(map: AliasMap): string {
  const picture = Buffer.from(map.svg, 'utf8').toString('base64');
  return page(`<h1>${escapeHtml(map.title)}</h1>
<img alt="${escapeHtml(map.title)}; the same map as text follows" src="data:image/svg+xml;base64,${picture}">
<details><summary>As text</summary><pre>${escapeHtml(map.text)}</pre></details>`);
}

/** The page shown where there is no map to show, with the reason. */
export function emptyMapPage(reason: string): string {
  return page(`<p>${escapeHtml(reason)}</p>`);
}
