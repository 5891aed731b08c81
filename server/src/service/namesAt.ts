/** Which names of a project stand at a point of one of its files. A range such as `D[0..7]` is several. */
import type { NameRecord, Place, Project } from '../board/model';
import type { Session } from './session';

export interface NamesAt {
  readonly project: Project;
  readonly records: readonly NameRecord[];
  /** The name under the point. */
  readonly place: Place;
}

/** For each project that the file belongs to. */
export function namesAt(session: Session, path: string, offset: number): readonly NamesAt[] {
  return session.projectsOf(path).flatMap((root) => {
    const project = session.project(root);
    const mentions = namesIn(project, path).filter(({ place: { span } }) => span.start <= offset && offset <= span.end);
    // Beside a name and at the start of another, the one that begins here is meant.
    const start = Math.max(...mentions.map(({ place }) => place.span.start));
    const here = mentions.filter(({ place }) => place.span.start === start);
    return here.length === 0 ? [] : [{ project, records: [...new Set(here.map(({ record }) => record))], place: here[0].place }];
  });
}

/** Equal places once, in the order of the text. */
export function distinctPlaces(places: readonly Place[]): readonly Place[] {
  const distinct = new Map(places.map((place) => [`${place.span.start} ${place.span.end} ${place.path}`, place]));
  return [...distinct.values()].sort((a, b) => (a.path < b.path ? -1 : b.path < a.path ? 1 : a.span.start - b.span.start));
}

/** Every name of a file, wherever it stands. */
export function namesIn(project: Project, path: string): readonly Mention[] {
  return mentionsOf(project).get(path) ?? [];
}

export interface Mention {
  readonly place: Place;
  readonly record: NameRecord;
}

const known = new WeakMap<Project, ReadonlyMap<string, readonly Mention[]>>();

function mentionsOf(project: Project): ReadonlyMap<string, readonly Mention[]> {
  const before = known.get(project);
  if (before !== undefined) return before;
  const byPath = new Map<string, Mention[]>();
  for (const records of project.names.values()) {
    for (const record of records.values()) {
      for (const place of [...record.declarations, ...record.uses, ...record.waivers]) {
        const mentions = byPath.get(place.path);
        if (mentions === undefined) byPath.set(place.path, [{ place, record }]);
        else mentions.push({ place, record });
      }
    }
  }
  known.set(project, byPath);
  return byPath;
}
