/** A rig that comes with the extension. */
export interface Sample {
  readonly fileName: string;
  /** The rig's own name, from its `rig:` line. */
  readonly title: string;
  /** The comment that opens the file, on one line; empty where there is none. */
  readonly summary: string;
}

const RIG_LINE = /^rig:\s*(.+?)\s*$/m;

/** Reads from a sample's text what a person needs in order to choose it. */
export function describeSample(fileName: string, text: string): Sample {
  const name = RIG_LINE.exec(text)?.[1] ?? fileName;
  const comments: string[] = [];
  for (const line of text.split(/\r?\n/)) {
    if (!line.startsWith('#')) break;
    comments.push(line.replace(/^#+\s*/, '').trim());
  }
  return { fileName, title: name.replace(/^(['"])(.*)\1$/, '$2'), summary: comments.join(' ').trim() };
}
