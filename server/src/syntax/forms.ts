/** The form of a statement in one line, as the reference writes it: `swing VOLTAGE [to VOLTAGE]`. */
import type { Dimension } from '../units/dimension';
import type { NameKind, Part, StatementShape } from './grammar';

export function formOf(shape: StatementShape): string {
  const head = [shape.keyword, ...shape.parts.map(formOfPart)].join(' ').replaceAll(' ,', ',');
  if (shape.block === undefined) return head;
  return shape.block.required === 'always' ? `${head} { … }` : `${head} [{ … }]`;
}

export function formOfPart(part: Part): string {
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
    case 'optional': return `[${sequence(part.parts)}]`;
    case 'choice': return `(${part.of.map(sequence).join(' | ')})`;
    case 'suffixes': return part.of.map((parts) => (part.needs !== null && parts[0]!.is === 'keyword' && parts[0].word === part.needs ? sequence(parts) : `[${sequence(parts)}]`)).join(' ');
    case 'repeat': return `${sequence(part.parts.filter((each) => each.is !== 'optional-comma'))} …`;
  }
}

function sequence(parts: readonly Part[]): string {
  return parts.map(formOfPart).join(' ').replaceAll(' ,', ',');
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
