/** The form of a statement in one line, as the reference writes it: `swing VOLTAGE [to VOLTAGE]`. */
import type { Dimension } from '../units/dimension';
import type { NameKind, Part, StatementShape } from './grammar';

export function formOf(shape: StatementShape): string {
  return formPieces(shape, shape.parts).map(({ text }) => text).join('');
}

/** A stretch of a form: what stands for one part of the statement, or what stands between two. */
export interface FormPiece {
  readonly text: string;
  readonly part: Part | null;
}

/** `parts`: those of the shape, or of one of its alternatives. */
export function formPieces({ keyword, block }: StatementShape, parts: readonly Part[]): readonly FormPiece[] {
  const tail = block === undefined ? '' : block.required === 'always' ? ' { … }' : ' [{ … }]';
  return [between(keyword), ...(0 < parts.length ? [between(' '), ...sequence(parts)] : []), ...(tail === '' ? [] : [between(tail)])];
}

const between = (text: string): FormPiece => ({ text, part: null });

function piecesOf(part: Part): readonly FormPiece[] {
  switch (part.is) {
    case 'optional': return bracketed(part.parts);
    case 'choice': return [between('('), ...part.of.flatMap((parts, at) => [...(at === 0 ? [] : [between(' | ')]), ...sequence(parts)]), between(')')];
    case 'suffixes': return part.of.flatMap((parts, at) => [...(at === 0 ? [] : [between(' ')]), ...(part.needs !== null && parts[0]!.is === 'keyword' && parts[0].word === part.needs ? sequence(parts) : bracketed(parts))]);
    case 'repeat': return [...sequence(part.parts.filter((each) => each.is !== 'optional-comma')), between(' …')];
    default: return [{ text: wordOf(part), part }];
  }
}

function bracketed(parts: readonly Part[]): readonly FormPiece[] {
  return [between('['), ...sequence(parts), between(']')];
}

/** No space before a comma. */
function sequence(parts: readonly Part[]): readonly FormPiece[] {
  return parts.flatMap((part, at) => [...(at === 0 || part.is === 'comma' ? [] : [between(' ')]), ...piecesOf(part)]);
}

function wordOf(part: Exclude<Part, { readonly is: 'optional' | 'choice' | 'suffixes' | 'repeat' }>): string {
  switch (part.is) {
    case 'quantity': return dimensionForms[part.dimension];
    case 'count': return 'COUNT';
    case 'name': return part.declares ? 'NAME' : nameForms[part.of];
    case 'string': return '"TEXT"';
    case 'point': return '(X, Y[, Z])';
    case 'rule-name': return 'RULE';
    case 'keyword': return part.word;
    case 'word': return part.words.join('|');
    case 'comma': return ',';
    case 'optional-comma': return '[,]';
  }
}

const dimensionForms: Readonly<Record<Dimension, string>> = {
  length: 'LENGTH', area: 'AREA', time: 'TIME', frequency: 'FREQUENCY', voltage: 'VOLTAGE', current: 'CURRENT', resistance: 'RESISTANCE', capacitance: 'CAPACITANCE',
  inductance: 'INDUCTANCE', temperature: 'TEMPERATURE', level: 'DECIBELS', fraction: 'PERCENT', angle: 'ANGLE', field: 'FIELD', 'voltage-noise': 'VOLTAGE-DENSITY',
  'current-noise': 'CURRENT-DENSITY', number: 'NUMBER',
};

const nameForms: Readonly<Record<NameKind, string>> = {
  copper: 'LAYER', plane: 'PLANE', family: 'FAMILY', net: 'NET', pair: 'PAIR', loop: 'LOOP', group: 'GROUP', run: 'NAME', return: 'NAME', link: 'NAME', shield: 'NAME',
  ambient: 'NAME', board: 'NAME', stackup: 'NAME', any: 'NAME', free: 'NAME',
};
