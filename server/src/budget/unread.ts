/**
 * What belongs in a receiver's budget and could not be read: one clause each, that says what and where. A budget with any of them has
 * no margin and is never reported as within. What could be read and not computed is said by the way that it belongs to.
 */
import type { Project } from '../board/model';
import type { Receiver } from './receivers';
import type { Unaccounted } from './results';

export function unreadFor({ gaps }: Project, { subject, terms }: Receiver): readonly Unaccounted[] {
  // Of a pair, its nets as well.
  const names = [subject.name, ...terms.map(({ net }) => net.name)];
  return gaps
    .filter(({ affects }) => affects === null || names.some((name) => affects.includes(name)))
    .map(({ what, place }) => ({ what: `${what} could not be read`, place }));
}
