/**
 * Whether some property of a net, or of a family that it is, could not be read. What the net then seems
 * not to state is no second mistake: the first has its finding already.
 */
import type { Net, Place, Project } from '../board/model';

export function hasUnreadablePart({ gaps, families }: Project, net: Net): boolean {
  const declared: Place[] = [net.whole];
  const passed = new Set<string>();
  for (let name = net.family; name !== null && !passed.has(name); name = families.get(name)?.is ?? null) {
    passed.add(name);
    const family = families.get(name);
    if (family !== undefined) declared.push(family.whole);
  }
  return gaps.some(({ place }) => declared.some((whole) => isWithin(place, whole)));
}

function isWithin(part: Place, whole: Place): boolean {
  return part.path === whole.path && whole.span.start <= part.span.start && part.span.end <= whole.span.end;
}
