/**
 * A waiver names its subject and not what kind of thing that is: where a net and a run have one name, it stands on both. Which of
 * them it is for shows in what it hides, and it goes along with that one.
 */
import type { NameSet, Place, Project, Waiver } from '../../board/model';
import type { Refused } from '../rename';
import type { Session } from '../session';
import { keyOf } from './renaming';

export interface RenamedSet {
  readonly set: NameSet;
  readonly names: readonly string[];
  readonly projects: readonly Project[];
}

/** Places of waivers that stay, since they are for what has the same name in another set. */
export function waiversToLeave(session: Session, { set, names, projects }: RenamedSet): { readonly places: ReadonlySet<string> } | Refused {
  const places = new Set<string>();
  for (const project of projects) {
    for (const name of names) {
      const record = project.names.get(set)?.get(name);
      const others = [...project.names.values()].flatMap((records) => records.get(name) ?? []).filter((other) => other !== record && 0 < other.declarations.length);
      for (const place of others.length === 0 ? [] : (record?.waivers ?? [])) {
        const waiver = waiverAround(project, place);
        const kinds = waiver === undefined ? [] : kindsHidden(session, project, waiver, name);
        const own = kinds.filter((kind) => kind === record!.kind);
        if (own.length === 0) places.add(keyOf(place));
        else if (own.length < kinds.length) return { refused: `One waiver of ${waiver!.rule} is for the ${record!.kind} ${name} and for the ${others[0]!.kind} ${name}: part it in two first.` };
      }
    }
  }
  return { places };
}

function waiverAround({ waivers }: Project, { path, span }: Place): Waiver | undefined {
  return waivers.find(({ place }) => place.path === path && place.span.start <= span.start && span.end <= place.span.end);
}

/** Kinds of the subjects, each once, of the findings that it hides. */
function kindsHidden(session: Session, { root }: Project, { rule }: Waiver, name: string): readonly string[] {
  const hidden = session.analyse(root).findings.filter((finding) => finding.rule === rule && finding.subject?.name === name);
  return [...new Set(hidden.map(({ subject }) => subject!.kind))];
}
