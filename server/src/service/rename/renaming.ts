/** What is renamed from a point: the names that stand there, and every place of them that the session knows. */
import type { NameRecord, NameSet, Place, Project } from '../../board/model';
import { looksLikeRange, namesInRange } from '../../syntax/names';
import { distinctPlaces, namesAt } from '../namesAt';
import type { Refused } from '../rename';
import type { Session } from '../session';
import { waiversToLeave } from './sharedWaivers';
import { passedOverPlaces } from './passedOverPlaces';

export interface Renaming {
  readonly set: NameSet;
  readonly kind: NameRecord['kind'];
  /** One, or those of the range at the point in its order. */
  readonly names: readonly string[];
  /** The name or range as it stands at the point, without quotes. */
  readonly shown: string;
  readonly at: Place;
  readonly places: readonly Place[];
  /** Projects that see it. */
  readonly projects: readonly Project[];
}

export function placedNames(session: Session, path: string, offset: number): Renaming | Refused {
  const here = namesAt(session, path, offset).map((names) => ({ ...names, records: withoutShadows(names.records) }));
  const [first] = here;
  if (first === undefined) return { refused: 'No name that a board declares stands here.' };
  const sets = new Set(here.flatMap(({ records }) => records.map(({ set }) => set)));
  const [record] = first.records;
  if (1 < sets.size) return { refused: `${record!.name} names a ${[...new Set(here.flatMap(({ records }) => records.map(({ kind }) => kind)))].join(' and a ')} here: rename it where one of them is declared.` };
  const { set, kind } = record!;
  const at = first.place;
  const written = session.text(at.path)!.slice(at.span.start, at.span.end);
  const range = looksLikeRange(written) ? namesInRange(written) : 'one name';
  const names = typeof range === 'string' ? [record!.name] : range;
  const { places, projects } = everywhere(session, { set, names, from: here.map(({ project }) => project) });
  const left = waiversToLeave(session, { set, names, projects });
  if ('refused' in left) return left;
  return { set, kind, names, at, shown: typeof range === 'string' ? record!.name : written, projects, places: distinctPlaces([...places.filter((place) => !left.places.has(keyOf(place))), ...projects.flatMap((project) => passedOverPlaces(session, project, { set, names }))]) };
}

/** A guard that has a net's name is that net's. */
function withoutShadows(records: readonly NameRecord[]): readonly NameRecord[] {
  const named = records.filter(({ set }) => set !== 'conductor');
  return named.length === 0 ? records : named;
}

/** Projects that share a file in which the name stands see the same thing under it, and so on from one to the next. */
function everywhere(session: Session, { set, names, from }: { readonly set: NameSet; readonly names: readonly string[]; readonly from: readonly Project[] }): { places: readonly Place[]; projects: readonly Project[] } {
  const places = new Map<string, Place>();
  const projects = new Set<Project>();
  const placesIn = (project: Project) => names.flatMap((name) => {
    const record = project.names.get(set)?.get(name);
    return record === undefined ? [] : [...record.declarations, ...record.uses, ...record.waivers];
  });
  const enter = (project: Project, of: readonly Place[]) => {
    projects.add(project);
    for (const place of of) places.set(keyOf(place), place);
  };
  for (const project of from) enter(project, placesIn(project));
  const others = new Map(session.roots().map((root) => session.project(root)).filter((project) => !projects.has(project)).map((project) => [project, placesIn(project)]));
  for (let grew = true; grew; ) {
    grew = false;
    for (const [project, of] of others) {
      if (!of.some((place) => places.has(keyOf(place)))) continue;
      enter(project, of);
      others.delete(project);
      grew = true;
    }
  }
  return { places: distinctPlaces([...places.values()]), projects: [...projects] };
}

export function keyOf({ path, span }: Place): string {
  return `${span.start} ${span.end} ${path}`;
}
