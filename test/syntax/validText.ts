/**
 * Valid texts, made from the statements that the language says it has: every statement, every optional
 * part, every alternative and every order of suffixes comes up.
 */
import fc from 'fast-check';
import type { BlockKind, Part, StatementShape } from '../../server/src/syntax/grammar';
import { statementShapes } from '../../server/src/syntax/statements';
import type { Dimension } from '../../server/src/units/dimension';
import { fittingUnits } from '../../server/src/units/spelling';

const plainNames = ['A', 'VALVE_PWM', 'RX', 'GND1', 'gate-drive'];
/** Names that look like something else, where the next word is the name all the same. */
const oddNames = ['3V3', 'is', 'for', 'net', '10k', 'D[0]', '__proto__', 'RESET#', '"A B"', '"x ""y"" {;"', 'µ', '±5'];

export interface TextOptions {
  readonly oddNames: boolean;
  readonly separators: readonly string[];
}

export function validText(options: TextOptions): fc.Arbitrary<string> {
  return fc.array(statementText('file', options), { maxLength: 5 }).map((statements) => statements.map((each) => `${each}\n`).join(''));
}

/** One statement of a block, with its own block where it has one. */
export function statementText(kind: BlockKind, options: TextOptions): fc.Arbitrary<string> {
  return fc.oneof(...statementShapes[kind].map((shape) => shapeText(shape, options)));
}

export function shapeText(shape: StatementShape, options: TextOptions): fc.Arbitrary<string> {
  const head = fc.tuple(...shape.parts.map((part) => partText(part, options))).map((parts) => [shape.keyword, ...parts.filter((part) => part !== '')].join(' '));
  if (shape.block === undefined) return head;
  const { kind, required } = shape.block;
  const block = fc.tuple(fc.array(statementText(kind, options), { maxLength: 4 }), fc.constantFrom(...options.separators)).map(([statements, separator]) => `{${separator}${statements.join(separator)}${separator}}`);
  // Without `is`, the block is due.
  return fc.tuple(head, block, fc.boolean()).map(([text, inner, bare]) => (bare && required === 'unless-is' && / is \S+$/.test(text) ? text : `${text} ${inner}`));
}

function partText(part: Part, options: TextOptions): fc.Arbitrary<string> {
  switch (part.is) {
    case 'quantity': return quantityText(part.dimension, part.toleranced);
    case 'count': return fc.integer({ min: 1, max: 99 }).map(String);
    case 'name': return fc.constantFrom(...plainNames, ...(options.oddNames ? oddNames : []), ...(part.many ? ['D[0..3]', 'Q[[7..5]]_N'] : []));
    case 'string': return fc.constantFrom('"a text"', '"with ""quotes"" # { ; }"');
    case 'point': return fc.tuple(lengthText, lengthText, fc.option(lengthText)).map(([x, y, z]) => `(${x}, ${y}${z === null ? '' : `, ${z}`})`);
    case 'rule-name': return fc.constantFrom('over-budget', 'low-margin');
    case 'keyword': return fc.constant(part.word);
    case 'word': return fc.constantFrom(...part.words);
    case 'comma': return fc.constantFrom(',', ',\n');
    case 'optional-comma': return fc.constantFrom('', ',');
    case 'optional': return fc.option(sequence(part.parts, options), { nil: '' });
    case 'choice': return fc.oneof(...part.of.map((parts) => sequence(parts, options)));
    case 'suffixes': return fc.shuffledSubarray([...part.of], { minLength: 0 }).chain((chosen) => {
      const needed = part.of.find((parts) => parts[0]!.is === 'keyword' && parts[0].word === part.needs);
      const all = needed === undefined || chosen.includes(needed) ? chosen : [...chosen, needed];
      return fc.tuple(...all.map((parts) => sequence(parts, options))).map((texts) => texts.join(' '));
    });
    case 'repeat': {
      const [first, rest] = [part.parts.filter((each) => each.is !== 'optional-comma'), part.parts];
      return fc.tuple(sequence(first, options), fc.array(sequence(rest, options), { maxLength: 3 })).map(([one, more]) => [one, ...more].join(' '));
    }
  }
}

function sequence(parts: readonly Part[], options: TextOptions): fc.Arbitrary<string> {
  return fc.tuple(...parts.map((part) => partText(part, options))).map((texts) => texts.filter((text) => text !== '').join(' '));
}

const numberText = fc.constantFrom('1', '0.25', '.5', '12', '3e-1', '2.5E+1', '-4', '\u22122', '+7', '0');
const positiveText = fc.constantFrom('1', '0.25', '.5', '12', '3e-1');
const lengthText = fc.tuple(numberText, fc.constantFrom(' mm', 'mm', 'um', ' mil')).map(([number, unit]) => number + unit);
const codes: Partial<Record<Dimension, readonly string[]>> = { resistance: ['4R7', '10k', 'R47', '1M'], capacitance: ['2p2', '10n'], voltage: ['3V3'] };

function quantityText(dimension: Dimension, toleranced: boolean): fc.Arbitrary<string> {
  if (dimension === 'number') return fc.tuple(positiveText, fc.constantFrom('', ' ± 5 %', '+-5%')).map(([number, band]) => number + band);
  const plain = fc.tuple(numberText, fc.constantFrom('', ' '), fc.constantFrom(...fittingUnits(dimension))).map(([number, space, unit]) => number + space + unit);
  const banded = fc.tuple(positiveText, fc.constantFrom(...fittingUnits(dimension).filter((unit) => unit !== 'dBuV/m')), fc.constantFrom(' ± 10 %', '±10%', ' +- 5 %', ' +/- 0.5 %')).map(([number, unit, band]) => `${number} ${unit}${band}`);
  return fc.oneof(plain, ...(toleranced ? [banded] : []), ...(codes[dimension] === undefined ? [] : [fc.constantFrom(...codes[dimension])]));
}
