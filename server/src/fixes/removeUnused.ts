/** Takes out a waiver that hides nothing, or a declaration that nothing uses. */
import type { Finding } from '../rules/rule';
import { unusedDeclaration, type UnusedDeclaration } from '../rules/unusedDeclaration';
import { unusedWaiver, type UnusedWaiver } from '../rules/unusedWaiver';
import type { Fix, FixContext } from './fix';
import { judgedByFinding } from './judged';
import { removal } from './removal';

export function unusedRemoved(finding: Finding, context: FixContext): readonly Fix[] {
  const removed = whatGoes(finding);
  if (removed === null) return [];
  const { place, title } = removed;
  const fix = judgedByFinding(finding, context, title, [removal(context.text(place.path), place)]);
  return fix === null ? [] : [fix];
}

function whatGoes({ rule, fault }: Finding) {
  if (rule === unusedWaiver.name) return { place: (fault as UnusedWaiver).waiver.place, title: 'Remove the waiver' };
  if (rule !== unusedDeclaration.name) return null;
  const { unused, whole, kind } = fault as UnusedDeclaration;
  const [first] = unused;
  return whole && first !== undefined ? { place: first.whole, title: `Remove ${kind} ${first.name}${1 < unused.length ? ` and ${unused.length - 1} more` : ''}` } : null;
}
