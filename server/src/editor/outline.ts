import type { DocumentSymbol } from 'vscode-languageserver-types';
import { SymbolKind } from 'vscode-languageserver-types';
import { formatHz } from '../quantity/write.ts';
import type { Entry } from '../rig/entry.ts';
import type { Snapshot } from '../rig/snapshot.ts';
import type { Evaluation } from '../workbench/evaluation.ts';
import { runTotals, totalsText } from '../workbench/run-totals.ts';
import { protocolRange } from './convert.ts';

/**
 * The outline: the top-level keys, the named things below their sections, and each channel with its rate, a brace range
 * with its count too. What a run makes of data stands with the first of them.
 */
export function outlineOf(evaluation: Evaluation): DocumentSymbol[] {
  const { snapshot } = evaluation;
  const details = new Map<Entry, string>();
  for (const { result } of evaluation.channels) {
    const { rateHz, count, place } = result.channel;
    const words = [...(rateHz ? [formatHz(rateHz.value)] : []), ...(count > 1 ? [`${count} channels`] : [])];
    if (words.length > 0) details.set(place.entry, words.join(' · '));
  }
  const top: DocumentSymbol[] = [];
  for (const entry of snapshot.entries) {
    if (!entry.key) continue;
    const symbol = symbolOf(entry, snapshot, details.get(entry));
    // A section's own line stands ahead of its entries.
    const section = entry.section === undefined ? undefined : top.at(-1);
    if (section) {
      section.children ??= [];
      section.children.push(symbol);
      section.range = { start: section.range.start, end: symbol.range.end };
    } else top.push(symbol);
  }
  const totals = runTotals(evaluation);
  // Where no channel's samples have a size there is nothing to tell yet.
  if (totals && totals.channels > 0 && top[0]) top[0].detail = totalsText(totals);
  return top;
}

function symbolOf(entry: Entry, snapshot: Snapshot, detail: string | undefined): DocumentSymbol {
  const start = snapshot.startOf(entry) ?? 0;
  const key = entry.key!;
  return {
    name: entry.name === '' ? '(no name)' : entry.name,
    ...(detail === undefined ? {} : { detail }),
    kind: kindOf(entry),
    range: protocolRange(snapshot, start + key.start, start + Math.max(key.end, entry.value.end)),
    selectionRange: protocolRange(snapshot, start + key.start, start + key.end),
  };
}

function kindOf(entry: Entry): SymbolKind {
  switch (entry.section) {
    case undefined:
      return entry.value.kind === 'scalar' ? SymbolKind.String : SymbolKind.Namespace;
    case 'channels':
      return SymbolKind.Field;
    case 'clocks':
      return SymbolKind.Constant;
    case 'digitizers':
      return SymbolKind.Interface;
    case 'sensors':
      return SymbolKind.Struct;
    case 'filters':
      return SymbolKind.Function;
    case 'sources':
      return SymbolKind.Event;
    case 'groups':
      return SymbolKind.Array;
  }
}
