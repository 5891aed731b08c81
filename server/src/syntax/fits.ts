/** What fits at a place of the grammar, in the words of messages. */
import type { Dimension } from '../units/dimension';
import { dimensionInWords } from '../units/spelling';
import type { BlockKind, NameKind, Part, StatementShape } from './grammar';
import { statementShapes } from './statements';

/** The statement of this block that begins with the word. */
export function shapeOf(kind: BlockKind, keyword: string): StatementShape | undefined {
  return shapes.get(kind)!.get(keyword);
}

/** Every statement of this block. */
export function shapesOf(kind: BlockKind): readonly StatementShape[] {
  return statementShapes[kind];
}

export function keywordsOf(kind: BlockKind): readonly string[] {
  return [...shapes.get(kind)!.keys()];
}

/** Every fixed word of the language, whether it begins a statement or goes on with one. */
export const fixedWords: ReadonlySet<string> = new Set(
  Object.values(statementShapes).flatMap((list) => list.flatMap((shape) => [shape.keyword, ...shape.parts.flatMap(wordsIn)])),
);

/** The words with which a part may begin; none where a value begins it. */
export function firstWords(part: Part): readonly string[] {
  switch (part.is) {
    case 'keyword': return [part.word];
    case 'word': return part.words;
    case 'optional': return firstWords(part.parts[0]!);
    case 'choice':
    case 'suffixes': return part.of.flatMap((parts) => firstWords(parts[0]!));
    default: return [];
  }
}

/** `a time such as 40 ns`, `` `worst` or `rss` ``: what a message says belongs here. */
export function inWords(part: Part): string {
  switch (part.is) {
    case 'quantity': return quantityInWords([part]);
    case 'count': return 'a whole number';
    case 'name': return nameInWords(part.of);
    case 'string': return 'a text in quotes';
    case 'point': return 'a point such as `(10 mm, 4 mm)`';
    case 'rule-name': return 'the name of a rule';
    case 'keyword': return `\`${part.word}\``;
    case 'word': return listed(part.words.map((word) => `\`${word}\``));
    case 'comma':
    case 'optional-comma': return 'a comma';
    case 'optional':
    case 'repeat': {
      const [first, second] = part.parts;
      if (first!.is === 'optional-comma') return inWords(second!);
      return first!.is === 'comma' ? `a comma and ${inWords(second!)}` : inWords(first!);
    }
    case 'choice': {
      const quantities = part.of.flatMap(([first]) => (first!.is === 'quantity' ? [first!] : []));
      const others = part.of.filter(([first]) => first!.is !== 'quantity').map(([first]) => inWords(first!));
      return listed([...(0 < quantities.length ? [quantityInWords(quantities)] : []), ...others]);
    }
    case 'suffixes': return listed(part.of.map(([first]) => inWords(first!)));
  }
}

/** Dimensions of the alternatives that begin with a quantity. */
export function dimensionsOf(alternatives: readonly (readonly Part[])[]): readonly Dimension[] {
  return alternatives.flatMap(([first]) => (first!.is === 'quantity' ? [first!.dimension] : []));
}

export function quantityInWords(parts: readonly { readonly dimension: Dimension; readonly example: string }[]): string {
  return listed(parts.map(({ dimension, example }) => `${dimensionInWords(dimension)} such as \`${example}\``));
}

/** What fits at one place, each once: its words where it has any. */
export function allInWords(parts: readonly Part[]): string {
  const items = parts.flatMap((part) => {
    const words = firstWords(part);
    return 0 < words.length ? words.map((word) => `\`${word}\``) : [inWords(part)];
  });
  return listed([...new Set(items)]);
}

/** Enough of a list to see what is meant. */
export function someOf(words: readonly string[]): string {
  return words.length <= 8 ? words.join(', ') : `${words.slice(0, 7).join(', ')}, …`;
}

export function listed(items: readonly string[]): string {
  return items.length < 2 ? items.join('') : `${items.slice(0, -1).join(', ')} or ${items.at(-1)}`;
}

export function nameInWords(of: NameKind): string {
  switch (of) {
    case 'copper': return 'a layer';
    case 'plane': return 'a plane';
    case 'any':
    case 'free': return 'a name';
    default: return `the name of a ${of}`;
  }
}

function wordsIn(part: Part): readonly string[] {
  switch (part.is) {
    case 'keyword': return [part.word];
    case 'word': return part.words;
    case 'optional':
    case 'repeat': return part.parts.flatMap(wordsIn);
    case 'choice':
    case 'suffixes': return part.of.flatMap((parts) => parts.flatMap(wordsIn));
    default: return [];
  }
}

const shapes: ReadonlyMap<BlockKind, ReadonlyMap<string, StatementShape>> = new Map(
  Object.entries(statementShapes).map(([kind, list]) => [kind as BlockKind, new Map(list.map((shape) => [shape.keyword, shape]))]),
);
