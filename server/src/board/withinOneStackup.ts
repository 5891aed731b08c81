/** A run, a loop or a strip with its plane lies within one board: layers of two stackups have no distance from each other. */
import type { Span } from '../syntax/tree';
import { gap, placeIn, report, type Scope } from './resolution';
import type { ResolvedStackup } from './stackups';

export function withinOneStackup(scope: Scope, places: readonly { readonly in: ResolvedStackup; readonly span: Span }[]): boolean {
  const [first] = places;
  const other = places.find((place) => place.in !== first.in);
  if (first === undefined || other === undefined) return true;
  const name = (place: (typeof places)[number]) => (place.in.stackup.name === null ? 'the unnamed stackup' : `stackup ${place.in.stackup.name}`);
  report(scope, 'bad-value', other.span, `${scope.owner.called} lies in ${name(first)}; this is a layer of ${name(other)}`, { related: [{ place: placeIn(scope, first.span), message: `a layer of ${name(first)}` }] });
  gap(scope, other.span, `which board ${scope.owner.called} lies in`);
  return false;
}
