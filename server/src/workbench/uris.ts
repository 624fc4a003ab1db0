/** The scheme, what stands before the path, and the path of a URI that has folders. */
const WITH_FOLDERS = /^([a-zA-Z][a-zA-Z0-9+.-]*:\/\/[^/?#]*)(\/[^?#]*)$/;

/**
 * A URI in one of the many ways in which it may be written: clients differ in which characters they escape. Two that
 * name the same file are the same afterwards; one without folders stays as it is.
 */
export function canonicalUri(uri: string): string {
  const parts = WITH_FOLDERS.exec(uri);
  if (!parts) return uri;
  const segments = parts[2]!.split('/').map((segment) => escaped(unescaped(segment)));
  // The letter of a drive is the first segment behind the slash.
  if (/^[A-Z]%3A$/.test(segments[1] ?? '')) segments[1] = segments[1]!.toLowerCase().replace('%3a', '%3A');
  return parts[1]!.toLowerCase() + segments.join('/');
}

/**
 * The canonical URI of a path that a file names, which is relative to the file's own folder; `undefined` for a file
 * that lies in no folder. A path that climbs past the top stays there.
 *
 * @param base the file's canonical URI
 */
export function uriOfPath(base: string, path: string): string | undefined {
  const parts = WITH_FOLDERS.exec(base);
  if (!parts) return undefined;
  const segments = path.startsWith('/') ? [] : parts[2]!.split('/').slice(1, -1);
  for (const segment of path.split('/')) {
    if (segment === '..') segments.pop();
    else if (segment !== '.' && segment !== '') segments.push(escaped(segment));
  }
  return `${parts[1]}/${segments.join('/')}`;
}

/** The name of a file, without its folder. */
export function fileNameOf(uri: string): string {
  return unescaped(uri.slice(uri.lastIndexOf('/') + 1));
}

function escaped(text: string): string {
  // What is only half of a character has no place in a URI.
  return encodeURIComponent(text.replace(/\p{Surrogate}/gu, '\uFFFD')).replace(
    /[!'()*]/g,
    (character) => `%${character.charCodeAt(0).toString(16).toUpperCase()}`,
  );
}

function unescaped(segment: string): string {
  try {
    return decodeURIComponent(segment);
  } catch {
    return segment;
  }
}
