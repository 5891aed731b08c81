/** Why a name cannot be given anew: each in one sentence, with the place that stands in the way. */
import type { NameRecord, Place, Project } from '../../board/model';
import { looksLikeRange, namesInRange } from '../../syntax/names';
import type { Edit } from '../answers';
import type { Session } from '../session';
import { keyOf, type Renaming } from './renaming';
import { unreadablePlaces } from './unreadablePlaces';

/** Whatever the new name. */
export function obstacle(session: Session, renaming: Renaming): string | null {
  const { set, names, kind, places, projects, shown } = renaming;
  const declared = projects.some((project) => names.some((name) => 0 < (project.names.get(set)?.get(name)?.declarations.length ?? 0)));
  if (!declared && set === 'family') return `${shown} is built into the language: declare a family of your own to give it another name.`;
  if (!declared && set !== 'group' && set !== 'conductor') return `${shown} is declared nowhere.`;
  for (const place of places) {
    const written = session.text(place.path)!.slice(place.span.start, place.span.end);
    const all = looksLikeRange(written) ? namesInRange(written) : [];
    if (typeof all === 'string' || all.every((name) => names.includes(name))) continue;
    return `${shown} is part of ${written} (${inWords(session, place)}): rename that, or write its ${kind}s one by one first.`;
  }
  const hidden = projects.flatMap((project) => unreadablePlaces(session, project, { set, names })).find((place) => !places.some((known) => keyOf(known) === keyOf(place)));
  return hidden === undefined ? null : `${shown} also stands in a line that could not be read (${inWords(session, hidden)}): mend that first.`;
}

/** Something else has one of the new names already. */
export function taken(session: Session, { set, names, projects }: Renaming, by: ReadonlyMap<string, string>): string | null {
  const wanted = [...by.values()].filter((name) => !names.includes(name));
  for (const project of projects) {
    for (const name of wanted) {
      // A guard or return of a row that has the name of a net is that net's.
      const record = project.names.get(set)?.get(name) ?? (set === 'conductor' ? project.names.get('signal')?.get(name) : undefined);
      if (record !== undefined) return takenBy(session, record);
    }
  }
  return null;
}

function takenBy(session: Session, { name, kind, declarations, uses }: NameRecord): string {
  const [declared] = declarations;
  if (declared !== undefined) return `There is a ${kindInWords[kind] ?? kind} ${name} already (${inWords(session, declared)}).`;
  if (kind === 'family') return `${name} is a family that is built into the language.`;
  const [use] = uses;
  return `There is a ${kindInWords[kind] ?? kind} ${name} already${use === undefined ? '' : ` (${inWords(session, use)})`}: the two would become one.`;
}

/**
 * The boards as they would be: the new name stands where the old one stood, and nowhere else. What names it without a declaration
 * would come to mean something, and a waiver on it would hide what it was not written for.
 */
export function captured(session: Session, { set, kind, projects }: Renaming, { by, edits }: { readonly by: ReadonlyMap<string, string>; readonly edits: readonly Edit[] }): string | null {
  for (const project of projects) {
    const after = session.projectWith(project.root, edits);
    for (const [old, name] of by) {
      const [before, now] = [project.names.get(set)?.get(old), after.names.get(set)?.get(name)];
      if (before === undefined) continue;
      if (now === undefined || now.declarations.length !== before.declarations.length || now.uses.length !== before.uses.length) return `${name} stands on the board already, though nothing declares it: ${old} would become what is meant there.`;
    }
    if (project.errors.length < after.errors.length) return `The text could no longer be read: ${after.errors[0]!.message}.`;
    const hidden = hiddenAnew(session, project, { kind, by });
    if (hidden !== null) return hidden;
  }
  return null;
}

function hiddenAnew(session: Session, project: Project, { kind, by }: { readonly kind: string; readonly by: ReadonlyMap<string, string> }): string | null {
  const waivers = project.waivers.filter(({ subjects }) => [...by].some(([old, name]) => old !== name && subjects.includes(name) && !by.has(name)));
  if (waivers.length === 0) return null;
  for (const { rule, subject, waived } of session.analyse(project.root).findings) {
    if (subject === null || subject.kind !== kind || waived !== null) continue;
    const waiver = waivers.find(({ rule: waivedRule, subjects }) => waivedRule === rule && subjects.includes(by.get(subject.name) ?? ''));
    if (waiver !== undefined) return `A waiver of ${rule} stands on ${by.get(subject.name)} already (${inWords(session, waiver.place)}), and would hide what is found on ${subject.name}.`;
  }
  return null;
}

const kindInWords: Partial<Record<NameRecord['kind'], string>> = { copper: 'copper layer', conductor: 'guard or return' };

/** `valve.quiet, line 12` */
function inWords(session: Session, { path, span }: Place): string {
  const lines = (session.text(path) ?? '').slice(0, span.start).split(/\r\n|\r|\n/).length;
  return `${path.slice(path.lastIndexOf('/') + 1)}, line ${lines}`;
}
