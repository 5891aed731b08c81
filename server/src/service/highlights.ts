/** The places in the file that is looked at where the name at a point stands: declared there, or referred to. */
import type { Span } from '../syntax/tree';
import { distinctPlaces, namesAt } from './namesAt';
import type { Session } from './session';

export interface Highlight {
  readonly span: Span;
  readonly kind: 'declaration' | 'use';
}

export function highlights(session: Session, path: string, offset: number): readonly Highlight[] {
  const records = namesAt(session, path, offset).flatMap((names) => names.records);
  const declared = new Set(records.flatMap(({ declarations }) => declarations).filter((place) => place.path === path).map(({ span }) => span.start));
  const places = distinctPlaces(records.flatMap(({ declarations, uses, waivers }) => [...declarations, ...uses, ...waivers]).filter((place) => place.path === path));
  return places.map(({ span }) => ({ span, kind: declared.has(span.start) ? 'declaration' : 'use' }));
}
