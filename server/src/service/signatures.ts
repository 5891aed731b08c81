/**
 * What follows the word of a statement: its values in their order, each with the units that fit, and which of them is due at the
 * point. From the table that the parser reads; a statement that can go on in several ways has a form for each.
 */
import { expectedAt } from '../syntax/expected';
import { inWords, listed, quantityInWords } from '../syntax/fits';
import { formPieces } from '../syntax/forms';
import type { Part, StatementShape } from '../syntax/grammar';
import type { SourceTree } from '../syntax/tree';
import { copperWeight, fittingUnits } from '../units/spelling';
import type { Session } from './session';
import { alternativesOf, entriesOf } from './signatures/alternatives';
import { wordMeanings } from './wordMeanings';

export interface Signature {
  /** `tolerates VOLTAGE peak|rms` */
  readonly label: string;
  readonly about: string;
  readonly parameters: readonly Parameter[];
  /** Index of the one that is due. */
  readonly active: number;
}

export interface Parameter {
  /** In the label, end exclusive: with the word before it, as in `to VOLTAGE`. */
  readonly start: number;
  readonly end: number;
  readonly about: string;
}

/** Those that what is written still leaves open; none where nothing more is due. */
export function signaturesAt(session: Session, path: string, offset: number): readonly Signature[] {
  const tree = session.tree(path);
  const due = tree === undefined ? [] : dueAt(tree, offset);
  const [first] = due;
  if (first === undefined) return [];
  const { shape } = first;
  const entries = new Set(due.filter((each) => each.shape === shape).flatMap(({ part }) => entriesOf(part)));
  return alternativesOf(shape.parts).flatMap((parts) => signatureOf(shape, parts, entries) ?? []);
}

/** The point is directly behind the first word of a statement and one space: the moment at which its form is worth showing unasked. */
export function beginsValues(session: Session, path: string, offset: number): boolean {
  const tree = session.tree(path);
  const word = tree?.tokens.find(({ end }) => end === offset - 1);
  if (tree === undefined || word?.kind !== 'word') return false;
  const [due] = dueAt(tree, offset);
  // A name may be spelt like the word before it: what is due is then no longer the first value.
  return due !== undefined && due.shape.keyword === tree.text.slice(word.start, word.end) && entriesOf(due.shape.parts[0]!).some((entry) => entriesOf(due.part).includes(entry));
}

interface Due {
  readonly part: Part;
  readonly shape: StatementShape;
}

function dueAt(tree: SourceTree, offset: number): readonly Due[] {
  const expected = expectedAt(tree, offset);
  if (expected !== null) return [...expected.units, ...expected.parts];
  // Within a name in quotes or a number it is this that is due.
  const under = tree.tokens.find(({ kind, start, end }) => (kind === 'word' || kind === 'string') && start < offset && offset <= end);
  return under === undefined ? [] : (expectedAt(tree, under.start)?.parts ?? []);
}

/** Null where what is due has no place in it: another alternative was chosen. */
function signatureOf(shape: StatementShape, parts: readonly Part[], entries: ReadonlySet<Part>): Signature | null {
  let label = '';
  let words: number | null = null;
  let waiting: Part[] = [];
  let active: number | null = null;
  const parameters: Parameter[] = [];
  const add = (start: number, about: string) => {
    if (active === null && waiting.some((part) => entries.has(part))) active = parameters.length;
    parameters.push({ start, end: label.length, about });
    [words, waiting] = [null, []];
  };
  for (const { text, part } of formPieces(shape, parts)) {
    // Words that nothing follows before a bracket are a value of their own: `both ways`.
    if (part === null && text.trim() !== '' && words !== null) add(words, '');
    const start = label.length;
    label += text;
    if (part === null) continue;
    waiting.push(part);
    if (part.is === 'keyword') words ??= start;
    else if (part.is !== 'comma' && part.is !== 'optional-comma') add(words ?? start, aboutPart(part, shape));
  }
  if (words !== null) add(words, '');
  return active === null ? null : { label, about: shape.about, parameters, active };
}

function aboutPart(part: Part, { keyword }: StatementShape): string {
  switch (part.is) {
    case 'quantity': {
      const units = [...fittingUnits(part.dimension), ...(part.copper ? [copperWeight] : [])];
      return `**${part.role}**: ${quantityInWords([part])}${units.length === 0 ? '' : `, in ${listed(units)}`}`;
    }
    case 'word': return part.words.map((word) => [`\`${word}\``, wordMeanings.get(`${keyword} ${word}`) ?? wordMeanings.get(word)].filter((each) => each !== undefined).join(': ')).join('  \n');
    case 'name': return part.declares ? `the name of this ${keyword}${part.many ? ', or a range of names such as `D[0..7]`' : ''}` : `${inWords(part)}${part.many ? ', or a range of names such as `D[0..7]`' : ''}`;
    default: return inWords(part);
  }
}
