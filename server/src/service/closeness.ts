/**
 * How well a name fits what a person typed of it: its letters in their order, whatever stands between. -Infinity where they do not
 * stand in it so. The whole name is closest, then its beginning, then letters that begin its words or follow each other.
 */
export function closeness(query: string, name: string): number {
  if (query === '') return 0;
  // Nobody types a name this long, and the search is longer with each letter.
  if (longest < query.length) return -Infinity;
  const [wanted, within] = [query.toLowerCase(), name.toLowerCase()];
  if (wanted === within) return query === name ? 1e6 : 1e6 - 1;
  // Lower case may be longer than what was written: the letters then no longer stand at their places.
  const bounds = within.length === name.length ? name : within;
  let best = -Infinity;
  for (let start = within.indexOf(wanted[0]!); start !== -1; start = within.indexOf(wanted[0]!, start + 1)) {
    best = Math.max(best, from(wanted, within, { bounds, start }));
  }
  return best - within.length / 1000;
}

const longest = 100;

/** Beginning at one place, each letter is taken where it comes next; where a word begins with it further on, there. */
function from(wanted: string, within: string, { bounds, start }: { readonly bounds: string; readonly start: number }): number {
  let points = pointsAt(bounds, start, -2);
  let last = start;
  for (let at = 1; at < wanted.length; at += 1) {
    const next = within.indexOf(wanted[at]!, last + 1);
    if (next === -1) return -Infinity;
    let taken = next;
    for (let other = next; other !== -1 && next !== last + 1; other = within.indexOf(wanted[at]!, other + 1)) {
      if (!beginsWord(bounds, other) || !holdsRest(wanted, within, { at: at + 1, from: other + 1 })) continue;
      taken = other;
      break;
    }
    points += pointsAt(bounds, taken, last);
    last = taken;
  }
  return points;
}

function holdsRest(wanted: string, within: string, { at, from: begin }: { readonly at: number; readonly from: number }): boolean {
  for (let index = at, place = begin; index < wanted.length; index += 1, place += 1) {
    place = within.indexOf(wanted[index]!, place);
    if (place === -1) return false;
  }
  return true;
}

function pointsAt(name: string, at: number, last: number): number {
  return 1 + (at === 0 ? 8 : 0) + (at === last + 1 ? 4 : 0) + (beginsWord(name, at) ? 3 : 0);
}

/** After a sign, at a capital after a small letter, at a number. */
function beginsWord(name: string, at: number): boolean {
  if (at === 0) return true;
  const [before, here] = [name[at - 1]!, name[at]!];
  return (!isLetterOrDigit(before) && isLetterOrDigit(here)) || (isSmall(before) && !isSmall(here)) || (!isDigit(before) && isDigit(here));
}

const isLetterOrDigit = (character: string) => /[\p{L}\p{N}]/u.test(character);
const isSmall = (character: string) => character !== character.toUpperCase();
const isDigit = (character: string) => '0' <= character && character <= '9';
