import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';

const root = new URL('../..', import.meta.url);

interface Setting {
  readonly type: string;
  readonly default: unknown;
  readonly description: string;
  readonly enum?: readonly string[];
  readonly enumDescriptions?: readonly string[];
}

interface Manifest {
  readonly name: string;
  readonly publisher: string;
  readonly version: string;
  readonly main: string;
  readonly icon: string;
  readonly activationEvents: readonly string[];
  readonly extensionKind: readonly string[];
  readonly capabilities: {
    readonly untrustedWorkspaces: { readonly supported: boolean };
    readonly virtualWorkspaces: { readonly supported: boolean };
  };
  readonly contributes: {
    readonly languages: readonly [
      { readonly id: string; readonly extensions: string[]; readonly configuration: string },
    ];
    readonly grammars: readonly [{ readonly language: string; readonly scopeName: string; readonly path: string }];
    readonly commands: readonly { readonly command: string; readonly category: string; readonly title: string }[];
    readonly menus: Readonly<Record<string, readonly { readonly command: string }[]>>;
    readonly configuration: { readonly properties: Readonly<Record<string, Setting>> };
    readonly configurationDefaults: Readonly<Record<string, Readonly<Record<string, unknown>>>>;
  };
}

const manifest: Manifest = createRequire(import.meta.url)('../../package.json');
const { contributes } = manifest;
const source = (path: string) => readFileSync(new URL(path, root), 'utf8');

describe('the language', () => {
  it('is called rig and takes files by their double ending', () => {
    expect(contributes.languages[0].id).toBe('rig');
    expect(contributes.languages[0].extensions).toEqual(['.rig.yaml', '.rig.yml', '.rig.json']);
    expect(contributes.grammars[0].language).toBe('rig');
    expect(JSON.parse(source(contributes.grammars[0].path)).scopeName).toBe(contributes.grammars[0].scopeName);
  });

  it('points at files that are there', () => {
    for (const path of [contributes.languages[0].configuration, contributes.grammars[0].path, manifest.icon]) {
      expect(existsSync(new URL(path, root)), path).toBe(true);
    }
  });

  it('wakes the extension for every ending, whatever language the file was left in', () => {
    expect(manifest.activationEvents).toEqual(
      contributes.languages[0].extensions.map((ending) => `workspaceContains:**/*${ending}`),
    );
  });
});

describe('commands', () => {
  const names = contributes.commands.map(({ command }) => command);

  it('stand under one heading in the palette', () => {
    expect(contributes.commands.map(({ category, title }) => `${category}: ${title}`)).toEqual([
      'Ratewright: New rig file from sample',
      'Ratewright: Show alias map',
      'Ratewright: Fix every channel',
      'Ratewright: Restart',
    ]);
  });

  it('are the only ones that menus use', () => {
    for (const [menu, items] of Object.entries(contributes.menus)) {
      for (const { command } of items) expect(names, menu).toContain(command);
    }
  });
});

describe('settings', () => {
  const settings = Object.entries(contributes.configuration.properties);

  it('say in whole sentences what each does, and what each choice does', () => {
    for (const [name, setting] of settings) {
      expect(setting.description, name).toMatch(/^[A-Z][^!]*\.$/);
      expect(setting.enumDescriptions?.length, name).toBe(setting.enum?.length);
      for (const description of setting.enumDescriptions ?? []) expect(description, name).toMatch(/^[A-Z][^!]*\.$/);
    }
  });

  it('have the defaults that the client falls back to', () => {
    const read = [...source('client/src/settings.ts').matchAll(/settings\.get<\w+>\('([\w.]+)', (true|'\w+')\)/g)];
    const fallbacks = read.map(([, name, value]) => [`ratewright.${name}`, JSON.parse(value!.replaceAll("'", '"'))]);
    const defaults = settings.map(([name, setting]) => [name, setting.default]);
    // The trace is read by the language client library, by this name.
    expect(new Map(defaults as [string, unknown][])).toEqual(
      new Map([...(fallbacks as [string, unknown][]), ['ratewright.trace.server', 'off']]),
    );
  });
});

describe('defaults for rig files', () => {
  it('are two spaces, and suggestions inside quotes', () => {
    expect(contributes.configurationDefaults['[rig]']).toMatchObject({
      'editor.insertSpaces': true,
      'editor.tabSize': 2,
      'editor.quickSuggestions': { other: true, comments: false, strings: true },
    });
  });

  it('show reference pages of any version of this extension, and no other page, as they read', () => {
    const associations = Object.keys(contributes.configurationDefaults['workbench.editorAssociations'] ?? {});
    expect(associations).toEqual([`**/${manifest.publisher}.${manifest.name}-*/dist/reference/**/*.md`]);
  });
});

describe('where it runs', () => {
  it('works in an untrusted folder, and beside the files', () => {
    expect(manifest.capabilities.untrustedWorkspaces.supported).toBe(true);
    expect(manifest.capabilities.virtualWorkspaces.supported).toBe(false);
    expect(manifest.extensionKind).toEqual(['workspace']);
    expect(manifest.main).toBe('./dist/client.cjs');
  });
});
