/**
 * A name given anew at every place that means it, in all files of all projects that see it: its declarations, its uses, the waivers
 * on it. Refused, with the reason, where that cannot be done without changing what a board says.
 */
import { namesInRange } from '../syntax/names';
import type { Span } from '../syntax/tree';
import type { Edit } from './answers';
import { newNames } from './rename/newNames';
import { captured, obstacle, taken } from './rename/obstacles';
import { placedNames, type Renaming } from './rename/renaming';
import { respelt } from './rename/respelt';
import type { Session } from './session';

export interface Refused {
  /** Why, in one sentence. */
  readonly refused: string;
}

export interface RenameTarget {
  /** The name as it stands in the text, quotes included. */
  readonly span: Span;
  /** Without quotes: what is there to be typed over. */
  readonly name: string;
}

/** What would be renamed from here. */
export function renameTarget(session: Session, path: string, offset: number): RenameTarget | Refused {
  const renaming = placedNames(session, path, offset);
  if ('refused' in renaming) return renaming;
  const stands = obstacle(session, renaming);
  return stands === null ? { span: renaming.at.span, name: renaming.shown } : { refused: stands };
}

/** `typed`: as a person writes it, with or without quotes; a range for a range. */
export function renameEdits(session: Session, path: string, offset: number, typed: string): { readonly edits: readonly Edit[] } | Refused {
  const renaming = placedNames(session, path, offset);
  if ('refused' in renaming) return renaming;
  const stands = obstacle(session, renaming);
  if (stands !== null) return { refused: stands };
  const chosen = newNames(renaming, typed);
  if ('refused' in chosen) return chosen;
  const { by } = chosen;
  if ([...by].every(([old, name]) => old === name)) return { edits: [] };
  const other = taken(session, renaming, by);
  if (other !== null) return { refused: other };
  const edits = editsOf(session, renaming, by);
  if ('refused' in edits) return edits;
  const caught = captured(session, renaming, { by, edits: edits.edits });
  return caught === null ? edits : { refused: caught };
}

function editsOf(session: Session, { places, names }: Renaming, by: ReadonlyMap<string, string>): { readonly edits: readonly Edit[] } | Refused {
  const edits: Edit[] = [];
  for (const { path, span } of places) {
    const written = session.text(path)!.slice(span.start, span.end);
    const newText = respelt(written, by);
    if (newText === null) return { refused: `${written} would no longer be a range: ${inWords(namesOf(written), by, names)}` };
    if (newText !== written) edits.push({ path, span, newText });
  }
  return { edits };
}

function namesOf(written: string): readonly string[] {
  const names = namesInRange(written);
  return typeof names === 'string' ? [] : names;
}

function inWords(all: readonly string[], by: ReadonlyMap<string, string>, names: readonly string[]): string {
  const [first] = all.filter((name) => names.includes(name));
  return first === undefined ? 'its names would have no order' : `${first} in it would be ${by.get(first) ?? first}`;
}
