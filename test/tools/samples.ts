import { readdirSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';

const FOLDER = resolve(import.meta.dirname, '../../client/samples');

/** The sample rigs that come with the extension. */
export const SAMPLES: readonly { readonly name: string; readonly path: string; readonly text: string }[] = readdirSync(
  FOLDER,
)
  .sort()
  .map((name) => ({ name, path: join(FOLDER, name), text: readFileSync(join(FOLDER, name), 'utf8') }));

/** The rig that the reference's figures are worked out for. */
export const EXTRACT_FAN_PATH = resolve(import.meta.dirname, '../published/extract-fan.rig.yaml');
export const EXTRACT_FAN = readFileSync(EXTRACT_FAN_PATH, 'utf8');
