/** The ways in which a statement can go on, each without a choice in it. */
import type { Part } from '../../syntax/grammar';

export function alternativesOf(parts: readonly Part[]): readonly (readonly Part[])[] {
  return parts.reduce<readonly (readonly Part[])[]>((before, part) => before.flatMap((head) => waysOf(part).map((tail) => [...head, ...tail])), [[]]);
}

function waysOf(part: Part): readonly (readonly Part[])[] {
  switch (part.is) {
    case 'choice': return part.of.flatMap(alternativesOf);
    case 'optional': return alternativesOf(part.parts).map((parts) => [{ ...part, parts }]);
    default: return [[part]];
  }
}

/** What may be written first of a part, a comma apart: every comma is one and the same, and says nothing of what follows. */
export function entriesOf(part: Part): readonly Part[] {
  switch (part.is) {
    case 'optional':
    case 'repeat': return entriesOf(part.parts.find(({ is }) => is !== 'comma' && is !== 'optional-comma')!);
    case 'choice':
    case 'suffixes': return part.of.flatMap(([first]) => entriesOf(first!));
    default: return [part];
  }
}
