/**
 * What can be written at a point: statements where one may begin, the words, names and units that fit
 * within one. The parser says what fits, the project which names there are.
 */
import { builtInFamilies } from '../board/builtInFamilies';
import type { NameRecord, NameSet, Project } from '../board/model';
import { rules } from '../rules/index';
import { isSpace } from '../syntax/characters';
import { expectedAt, type Expected } from '../syntax/expected';
import { languageVersion } from '../syntax/parse';
import { shapesOf } from '../syntax/fits';
import type { BlockKind, NameKind, Part, StatementShape } from '../syntax/grammar';
import { formOf } from '../syntax/forms';
import type { SourceTree, Span, Statement } from '../syntax/tree';
import { writtenName } from '../syntax/writtenName';
import { copperWeight, dimensionInWords, fittingUnits } from '../units/spelling';
import type { Completion, CompletionKind } from './answers';
import { declarationSnippets } from './declarationSnippets';
import { statementMarkdown, unitMarkdown, wordMarkdown } from './keywordDocumentation';
import { setsOf } from './nameSets';
import type { Session } from './session';

export function completions(session: Session, path: string, offset: number): readonly Completion[] {
  const tree = session.tree(path);
  const expected = tree === undefined ? null : expectedAt(tree, offset);
  if (tree === undefined || expected === null) return [];
  const offers = expected.block !== null ? statementOffers(tree, expected.block, expected.span) : [...unitOffers(tree.text, expected), ...expected.parts.flatMap(({ part, shape }) => partOffers(session, { path, span: expected.span }, part, shape))];
  const distinct = new Map(offers.map((offer) => [`${offer.kind} ${offer.label}`, offer]));
  return [...distinct.values()].map((offer, rank) => ({ ...offer, span: expected.span, newText: offer.newText ?? offer.label, snippet: offer.kind === 'declaration', rank }));
}

interface Offer {
  readonly label: string;
  readonly kind: CompletionKind;
  readonly detail: string;
  readonly documentation: string;
  /** The label where it is not stated. */
  readonly newText?: string;
}

function statementOffers(tree: SourceTree, kind: BlockKind, span: Span): readonly Offer[] {
  const stated = new Set(statementsAround(tree, kind, span).map(({ keyword }) => keyword));
  const shapes = shapesOf(kind).filter((shape) => shape.repeats || !stated.has(shape.keyword));
  const isFirst = kind === 'file' && tree.version === null && !tree.tokens.some(({ kind: token, start }) => (token === 'word' || token === 'string') && start < span.start);
  const version: Offer = { label: 'quietrun', kind: 'keyword', detail: 'version of the language', documentation: 'The version of the language that the file is written in: an optional first statement.', newText: `quietrun ${languageVersion}` };
  return [...(isFirst ? [version] : []), ...shapes.map((shape) => ({ label: shape.keyword, kind: 'keyword' as const, detail: formOf(shape).slice(shape.keyword.length).trim(), documentation: statementMarkdown(shape) })), ...(kind === 'file' ? snippetOffers() : [])];
}

function snippetOffers(): readonly Offer[] {
  return declarationSnippets.map(({ prefix, about, body }) => ({ label: prefix, kind: 'declaration' as const, detail: about, documentation: `\`\`\`quietrun\n${plain(body)}\n\`\`\``, newText: body }));
}

/** As it is before anything is filled in. */
function plain(body: string): string {
  return body.replace(/\$\{\d+:([^}]*)\}/g, '$1').replace(/\$\{\d+\|([^,|]*)[^}]*\|\}/g, '$1').replace(/\$\d+/g, '').trimEnd();
}

/** Statements of the block around the point, but for the one that is being written. */
function statementsAround(tree: SourceTree, kind: BlockKind, { start }: Span): readonly Statement[] {
  let statements = tree.statements;
  while (kind !== 'file') {
    const inner = statements.find(({ block }) => block !== null && block.span.start < start && (start < block.span.end || !block.closed))?.block;
    if (inner === null || inner === undefined) break;
    statements = inner.statements;
  }
  return statements.filter(({ keywordSpan }) => keywordSpan.start !== start);
}

function unitOffers(text: string, { units, span }: Expected): readonly Offer[] {
  // One space between number and unit, whether or not it has been typed.
  const isGlued = 0 < span.start && !isSpace(text.charCodeAt(span.start - 1));
  return units.flatMap(({ part: { dimension, copper } }) => [...fittingUnits(dimension), ...(copper ? [copperWeight] : [])].map((unit) => ({
    label: unit, kind: 'unit' as const, detail: dimensionInWords(dimension).replace(/^an? /, ''), documentation: unitMarkdown(unit) ?? '', newText: isGlued ? ` ${unit}` : unit,
  })));
}

interface At {
  readonly path: string;
  readonly span: Span;
}

function partOffers(session: Session, at: At, part: Part, shape: StatementShape): readonly Offer[] {
  switch (part.is) {
    case 'keyword': return [wordOffer(part.word, 'keyword', shape)];
    case 'word': return part.words.map((word) => wordOffer(word, 'word', shape));
    case 'rule-name': return rules.filter((rule) => rule.waivable).map((rule) => ({ label: rule.name, kind: 'rule' as const, detail: rule.severity, documentation: rule.documentation.finds }));
    case 'name': return part.declares ? [] : nameOffers(session, at, part.of, shape);
    case 'optional': return partOffers(session, at, part.parts[0]!, shape);
    case 'choice':
    case 'suffixes': return part.of.flatMap(([first]) => partOffers(session, at, first!, shape));
    default: return [];
  }
}

function wordOffer(word: string, kind: CompletionKind, shape: StatementShape): Offer {
  return { label: word, kind, detail: '', documentation: wordMarkdown(word, shape) };
}

function nameOffers(session: Session, { path, span }: At, of: NameKind, shape: StatementShape): readonly Offer[] {
  return session.projectsOf(path).flatMap((root) => {
    const project = session.project(root);
    return namesOf(project, of, shape).filter((record) => !isOnlyHere(record, path, span)).map((record) => ({
      label: record.name,
      kind: record.set === 'layer' ? ('layer' as const) : record.set === 'family' ? ('family' as const) : ('name' as const),
      detail: record.kind === 'conductor' ? '' : record.kind,
      documentation: documentationOf(project, record),
      newText: writtenName(record.name),
    }));
  });
}

/** The word that is being written is no name to offer for it. */
function isOnlyHere(record: NameRecord, path: string, span: Span): boolean {
  return record.declarations.length === 0 && 0 < record.uses.length && record.uses.every((use) => use.path === path && use.span.start === span.start);
}

function namesOf(project: Project, of: NameKind, shape: StatementShape): readonly NameRecord[] {
  const sets = shape.keyword === 'waive' ? waivableSets : setsOf[of];
  return sets.flatMap((set) => [...(project.names.get(set)?.values() ?? [])]).filter((record) => isFitting(record, of, shape));
}

function isFitting({ kind, name, declarations }: NameRecord, of: NameKind, { keyword }: StatementShape): boolean {
  switch (of) {
    case 'free': return true;
    // A loop is covered, but nothing senses or refers to one.
    case 'any': return keyword === 'waive' ? 0 < declarations.length : keyword === 'covers' || kind !== 'loop';
    case 'family': {
      const builtIn = 0 < declarations.length ? undefined : builtInFamilies.find((family) => family.name === name);
      return builtIn === undefined || keyword === 'family' || builtIn.of === keyword;
    }
    default: return kind === of;
  }
}

const waivableSets: readonly NameSet[] = ['signal', 'run', 'return', 'link', 'shield', 'ambient', 'family', 'board'];

function documentationOf(project: Project, { kind, name }: NameRecord): string {
  if (kind === 'family') {
    const builtIn = builtInFamilies.find((family) => family.name === name);
    return project.families.get(name)?.documentation ?? (builtIn === undefined ? '' : `${builtIn.standard}: ${builtIn.arithmetic}`);
  }
  const signal = kind === 'net' ? project.nets.get(name) : kind === 'pair' ? project.pairs.get(name) : undefined;
  return signal?.documentation ?? '';
}
