/** What a word of the language or a unit means, for hovers and completion: from the same table that the parser reads. */
import { fixedWords, shapeOf } from '../syntax/fits';
import { formOf } from '../syntax/forms';
import type { BlockKind, Part, StatementShape } from '../syntax/grammar';
import type { QuantityValue, SourceTree, Span, Statement, Value } from '../syntax/tree';
import type { Dimension } from '../units/dimension';
import { inText, unitOfSi } from '../units/inText';
import { dimensionInWords, fittingUnits, unitSpelt, type Unit } from '../units/spelling';
import type { HoverAnswer } from './answers';
import { wordMeanings } from './wordMeanings';

/** Of the keyword, fixed word or unit at the point; null where there is none. */
export function keywordDocumentation(tree: SourceTree, offset: number): HoverAnswer | null {
  const found = statementAt(tree.statements, 'file', offset);
  if (found === null) return null;
  const { statement, shape } = found;
  if (touches(statement.keywordSpan, offset)) return { span: statement.keywordSpan, markdown: statementMarkdown(shape) };
  const quantity = quantitiesIn(statement.values).find(({ unitSpan }) => unitSpan.start < unitSpan.end && touches(unitSpan, offset));
  if (quantity !== undefined) return hoverOf(quantity.unitSpan, unitMarkdown(quantity.unit));
  const named = statement.values.some((value) => value.kind === 'name' && touches(value.span, offset));
  const token = tree.tokens.find((each) => each.kind === 'word' && touches(each, offset));
  if (named || token === undefined) return null;
  const word = tree.text.slice(token.start, token.end);
  return fixedWords.has(word) ? hoverOf({ start: token.start, end: token.end }, wordMarkdown(word, shape)) : null;
}

/** What the statement says, its form, and the units that fit. */
export function statementMarkdown(shape: StatementShape): string {
  const examples = new Map<Dimension, string>();
  for (const { dimension, example } of shape.parts.flatMap(examplesIn)) if (dimension !== 'number' && !examples.has(dimension)) examples.set(dimension, example);
  const units = [...examples].map(([dimension, example]) => `- ${dimensionInWords(dimension)}: ${fittingUnits(dimension).map((unit) => `\`${unit}\``).join(', ')}, such as \`${example}\``);
  return [shape.about, '', '```quietrun', formOf(shape), '```', ...units].join('\n').trimEnd();
}

/** A word that goes on with a statement. */
export function wordMarkdown(word: string, shape: StatementShape): string {
  const meaning = wordMeanings.get(`${shape.keyword} ${word}`) ?? wordMeanings.get(word);
  return [...(meaning === undefined ? [] : [meaning, '']), '```quietrun', formOf(shape), '```'].join('\n');
}

/** What a unit measures, and what one of it is. */
export function unitMarkdown(spelling: string): string | null {
  const unit = unitSpelt(spelling);
  if (unit === undefined) return null;
  const measures = `\`${spelling}\` measures ${dimensionInWords(unit.dimension)}`;
  switch (unit.dimension) {
    case 'level': return `${measures}, in decibels.`;
    case 'fraction': return `${measures}: hundredths.`;
    case 'angle': return `${measures}: 360 make a full turn.`;
    default: if (unit.dimension === 'temperature' && !unit.toleranced) return `${measures}: 0 ${spelling} is ${unit.inSi({ digits: '0', exponent: 0 })} K.`;
      return `${measures}${inSiWords(spelling, unit)}.`;
  }
}

/** `: 1 uF is 10⁻⁶ F`; nothing for a unit that is that of the SI. Its own spelling, or a millimetre in millimetres, would say nothing. */
function inSiWords(spelling: string, { inSi, dimension }: Unit): string {
  const value = inSi({ digits: '1', exponent: 0 });
  if (value === 1) return '';
  const power = Math.round(Math.log10(value));
  const isPower = Number(`1e${power}`) === value;
  return `: 1 ${spelling} is ${isPower ? `10${superscript(power)} ${unitOfSi(dimension)}` : inText(value, dimension)}`;
}

const superscript = (power: number) => [...String(power)].map((each) => '⁻⁰¹²³⁴⁵⁶⁷⁸⁹'['-0123456789'.indexOf(each)]).join('');

function hoverOf(span: Span, markdown: string | null): HoverAnswer | null {
  return markdown === null ? null : { span: { start: span.start, end: span.end }, markdown };
}

function touches({ start, end }: Span, offset: number): boolean {
  return start <= offset && offset <= end;
}

/** The innermost statement around the point, with its shape. */
function statementAt(statements: readonly Statement[], kind: BlockKind, offset: number): { readonly statement: Statement; readonly shape: StatementShape } | null {
  const statement = statements.find(({ span }) => touches(span, offset));
  if (statement === undefined) return null;
  const inner = statement.block === null || !touches(statement.block.span, offset) ? null : statementAt(statement.block.statements, statement.block.kind, offset);
  const shape = shapeOf(kind, statement.keyword);
  return inner ?? (shape === undefined ? null : { statement, shape });
}

function quantitiesIn(values: readonly Value[]): readonly QuantityValue[] {
  return values.flatMap((value) => (value.kind === 'quantity' ? [value] : value.kind === 'point' ? [value.x, value.y, ...(value.z === null ? [] : [value.z])] : []));
}

interface Example {
  readonly dimension: Dimension;
  readonly example: string;
}

/** In the order in which they are written. */
function examplesIn(part: Part): readonly Example[] {
  switch (part.is) {
    case 'quantity': return [part];
    case 'point': return [{ dimension: 'length', example: '10 mm' }];
    case 'optional':
    case 'repeat': return part.parts.flatMap(examplesIn);
    case 'choice':
    case 'suffixes': return part.of.flatMap((parts) => parts.flatMap(examplesIn));
    default: return [];
  }
}
