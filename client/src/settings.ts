import { type ConfigurationChangeEvent, workspace } from 'vscode';

/** Which findings are shown; what is found stays the same. */
export type FindingsShown = 'all' | 'warnings' | 'errors';

export interface Settings {
  readonly hoverPicture: boolean;
  readonly findingsShown: FindingsShown;
}

export function readSettings(): Settings {
  const settings = workspace.getConfiguration('ratewright');
  return {
    hoverPicture: settings.get<boolean>('hover.picture', true),
    findingsShown: settings.get<FindingsShown>('findings.show', 'all'),
  };
}

/** Whether a change of settings is one that {@link readSettings} would see. */
export function changesSettings(change: ConfigurationChangeEvent): boolean {
  return change.affectsConfiguration('ratewright.hover') || change.affectsConfiguration('ratewright.findings');
}
