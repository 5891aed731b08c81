/** Every place that names what is named at a point, in all files of the projects that it belongs to. */
import type { Place } from '../board/model';
import { distinctPlaces, namesAt } from './namesAt';
import type { Session } from './session';

export interface ReferenceOptions {
  readonly includeDeclaration: boolean;
}

export function references(session: Session, path: string, offset: number, { includeDeclaration }: ReferenceOptions = { includeDeclaration: true }): readonly Place[] {
  const places = namesAt(session, path, offset).flatMap(({ records }) =>
    records.flatMap(({ declarations, uses, waivers }) => [...(includeDeclaration ? declarations : []), ...uses, ...waivers]));
  return distinctPlaces(places);
}
