/**
 * What the words of a file stand for, where that takes more than the word itself: which name is a net and which a layer, where it is
 * declared, and which net is over its budget.
 */
import type { NameRecord, Place } from '../board/model';
import type { QuantityValue, Span, Statement, Value } from '../syntax/tree';
import type { SemanticToken } from './answers';
import { namesIn } from './namesAt';
import type { Session } from './session';

/** In the order of the text; none overlaps another. */
export function semanticTokens(session: Session, path: string, within: Span): readonly SemanticToken[] {
  const tree = session.tree(path);
  if (tree === undefined) return [];
  const tokens = new Map<number, SemanticToken>();
  for (const token of [...quantities(tree.statements), ...names(session, path)]) {
    if (token.span.start < token.span.end && token.span.start < within.end && within.start < token.span.end) tokens.set(token.span.start, token);
  }
  return [...tokens.values()].sort((a, b) => a.span.start - b.span.start);
}

function quantities(statements: readonly Statement[]): readonly SemanticToken[] {
  return statements.flatMap(({ values, block }) => [...values.flatMap(quantitiesOf).flatMap(ofQuantity), ...quantities(block?.statements ?? [])]);
}

function quantitiesOf(value: Value): readonly QuantityValue[] {
  if (value.kind === 'quantity') return [value];
  return value.kind === 'point' ? [value.x, value.y, ...(value.z === null ? [] : [value.z])] : [];
}

const ofQuantity = ({ numberSpan, unitSpan }: QuantityValue): readonly SemanticToken[] => [
  { span: numberSpan, type: 'quantity', declaration: false, overBudget: false },
  { span: unitSpan, type: 'unit', declaration: false, overBudget: false },
];

function names(session: Session, path: string): readonly SemanticToken[] {
  return session.projectsOf(path).flatMap((root) => {
    const over = new Set(session.analyse(root).findings.flatMap(({ rule, waived, subject }) => (rule === 'over-budget' && waived === null && subject !== null ? [subject.name] : [])));
    const mentions = namesIn(session.project(root), path);
    // A range stands for several names at one place: it is over budget with one of them.
    const overAt = new Set(mentions.filter(({ record }) => record.set === 'signal' && over.has(record.name)).map(({ place }) => place.span.start));
    return mentions.map(({ place, record }) => ({ span: place.span, type: typeOf[record.kind], declaration: isDeclared(record, place), overBudget: overAt.has(place.span.start) }));
  });
}

const isDeclared = ({ declarations }: NameRecord, place: Place) => declarations.some((each) => each.path === place.path && each.span.start === place.span.start);

const typeOf: Readonly<Record<NameRecord['kind'], SemanticToken['type']>> = {
  net: 'net', pair: 'net', conductor: 'net', group: 'group',
  copper: 'layer', plane: 'layer', stackup: 'part', family: 'family',
  board: 'part', run: 'part', loop: 'part', return: 'part', link: 'part', shield: 'part', ambient: 'part',
};
