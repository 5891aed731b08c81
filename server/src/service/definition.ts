/** Where the name at a point is declared; from the path of a `use`, the file itself. */
import type { Place } from '../board/model';
import { distinctPlaces, namesAt } from './namesAt';
import type { Session } from './session';

export function definition(session: Session, path: string, offset: number): readonly Place[] {
  const declared = namesAt(session, path, offset).flatMap(({ records }) => records.flatMap(({ declarations }) => declarations));
  return distinctPlaces([...declared, ...fileUsedAt(session, path, offset)]);
}

function fileUsedAt(session: Session, path: string, offset: number): readonly Place[] {
  return session.projectsOf(path).flatMap((root) => {
    const { includes } = session.project(root);
    const include = includes.find(({ place }) => place.path === path && place.span.start <= offset && offset <= place.span.end);
    const target = include?.path ?? null;
    return target === null || session.text(target) === undefined ? [] : [{ path: target, span: { start: 0, end: 0 } }];
  });
}
