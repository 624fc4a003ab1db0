import type { InitializeParams } from 'vscode-languageserver-protocol';
import { MarkupKind } from 'vscode-languageserver-types';
import type { ReferenceLinks } from './reference-links.ts';
import { linksIn, NO_LINKS } from './reference-links.ts';

/** The kinds of colour theme that pictures are drawn for; `neutral` brings its own background. */
export const THEMES = ['light', 'dark', 'high-contrast', 'high-contrast-light', 'neutral'] as const;
export type ThemeKind = (typeof THEMES)[number];

/** What the client told of itself when it connected, as far as an answer depends on it. */
export interface ClientAbilities {
  readonly pullsFindings: boolean;
  /** Whether it may be asked to pull its findings again. */
  readonly refreshesFindings: boolean;
  /** Whether it watches files when it is asked to. */
  readonly watchesFiles: boolean;
  /** Whether it tells of folders that are added or taken away. */
  readonly announcesFolders: boolean;
  readonly announcesSettings: boolean;
  readonly showsMarkdown: boolean;
  /** Whether a hover may hold a picture; otherwise the map is drawn in characters. */
  readonly showsPictures: boolean;
  readonly edits: EditAbilities;
  readonly theme: ThemeKind;
  readonly links: ReferenceLinks;
}

/** How much of an edit of a file the client understands. */
export interface EditAbilities {
  /** Edits may name the version that they are of (`documentChanges`). */
  readonly versions: boolean;
  /** Edits may carry labels and ask to be confirmed (`changeAnnotations`); only those that name their version. */
  readonly annotations: boolean;
}

/**
 * Reads what a client announces. Pictures in hovers are not part of the protocol: our own client says in its
 * initialization options that it shows them, and any other may say the same.
 */
export function abilitiesOf(params: InitializeParams | undefined): ClientAbilities {
  const options: unknown = params?.initializationOptions;
  const folder = stringOption(options, 'referenceFolder');
  const formats = params?.capabilities.textDocument?.hover?.contentFormat ?? [];
  const edit = params?.capabilities.workspace?.workspaceEdit;
  const versions = edit?.documentChanges === true;
  return {
    pullsFindings: params?.capabilities.textDocument?.diagnostic !== undefined,
    refreshesFindings: params?.capabilities.workspace?.diagnostics?.refreshSupport === true,
    watchesFiles: params?.capabilities.workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    announcesFolders: params?.capabilities.workspace?.workspaceFolders === true,
    announcesSettings: params?.capabilities.workspace?.didChangeConfiguration?.dynamicRegistration === true,
    showsMarkdown: formats.includes(MarkupKind.Markdown),
    showsPictures: option(options, 'pictures') === true,
    edits: { versions, annotations: versions && edit?.changeAnnotationSupport !== undefined },
    theme: themeOf(option(options, 'theme')),
    links: folder === undefined ? NO_LINKS : linksIn(folder.replace(/\/$/, '')),
  };
}

/** The same client after its theme has changed. */
export function withTheme(abilities: ClientAbilities, theme: unknown): ClientAbilities {
  return { ...abilities, theme: themeOf(theme) };
}

function themeOf(value: unknown): ThemeKind {
  return THEMES.find((theme) => theme === value) ?? 'neutral';
}

function option(options: unknown, name: string): unknown {
  return typeof options === 'object' && options !== null ? (options as Record<string, unknown>)[name] : undefined;
}

function stringOption(options: unknown, name: string): string | undefined {
  const value = option(options, name);
  return typeof value === 'string' ? value : undefined;
}
