/**
 * What the editor shows of the thing under the cursor: a net its budget, a trace, a run, a gap its noise, a word of
 * the language its meaning. Numbers first, then where they come from, then the way out.
 */
import type { NameRecord, Net, Pair, Project } from '../board/model';
import { rules } from '../rules/index';
import { rulePage } from '../rules/rulePage';
import type { Span, Statement } from '../syntax/tree';
import type { HoverAnswer } from './answers';
import { declarationHover } from './hover/declarationHover';
import { escaped, escapedLines, paragraphs } from './hover/markdown';
import { withinSize } from './hover/pictureInMarkdown';
import { noPictures, type Pictures } from './hover/pictures';
import { signalHover } from './hover/netHover';
import { runHover, runPointHover } from './hover/runHover';
import { runPointAt } from './hover/runPoint';
import { wayHover } from './hover/wayHover';
import { keywordDocumentation } from './keywordDocumentation';
import { namesAt } from './namesAt';
import type { Analysis, Session } from './session';

/** In words alone. */
export function hover(session: Session, path: string, offset: number): HoverAnswer | null {
  return hoverAt(session, path, { offset, pictures: noPictures });
}

/** For those who show SVG images in Markdown. */
export function hoverWithPictures(session: Session, path: string, at: PicturedPoint): HoverAnswer | null {
  const answer = hoverAt(session, path, at);
  return answer === null ? null : { ...answer, markdown: withinSize(answer.markdown) };
}

export interface PicturedPoint {
  readonly offset: number;
  readonly pictures: Pictures;
}

function hoverAt(session: Session, path: string, point: PicturedPoint): HoverAnswer | null {
  const { offset } = point;
  const tree = session.tree(path);
  if (tree === undefined) return null;
  const word = keywordDocumentation(tree, offset);
  const rule = ruleAt(tree.statements, offset);
  if (rule !== null) return rule;
  const found = session.projectsOf(path).flatMap((root) => {
    const answer = inProject(session, root, { path, ...point });
    return answer === null ? [] : [{ root, ...answer }];
  });
  if (found.length === 0) return word === null ? null : { ...word, markdown: paragraphs(documentationAt(tree.statements, offset), word.markdown) };
  const texts = new Map(found.map(({ root, markdown }) => [markdown, root]));
  const several = 1 < texts.size;
  const parts = [...texts].slice(0, projectsShown).map(([markdown, root]) => (several ? paragraphs(`In ${escaped(root)}:`, markdown) : markdown));
  return { span: found[0].span, markdown: parts.join('\n\n---\n\n') };
}

/** The `##` lines over the statement of which the first word is under the cursor: a stackup row has no name to hover. */
function documentationAt(statements: readonly Statement[], offset: number): string | null {
  for (const { span, keywordSpan, documentation, block } of statements) {
    if (offset < span.start || span.end < offset) continue;
    if (keywordSpan.start <= offset && offset <= keywordSpan.end) return documentation === null ? null : escapedLines(documentation);
    if (block !== null) return documentationAt(block.statements, offset);
  }
  return null;
}

/** A file of shared parts may belong to many boards; each has numbers of its own. */
const projectsShown = 3;

/** Null where no name, number of a run or length stands at the point. */
function inProject(session: Session, root: string, { path, offset, pictures }: PicturedPoint & { readonly path: string }): { readonly span: Span; readonly markdown: string } | null {
  const project = session.project(root);
  const named = namesAt(session, path, offset).find((names) => names.project === project);
  const point = runPointAt(project, path, offset);
  if (named === undefined && point === null) return null;
  const analysis = session.analyse(root);
  const result = point === null ? undefined : analysis.evaluation.runs.find(({ run }) => run === point.run);
  const run = point === null || result === undefined ? null : { span: point.place.span, markdown: runPointHover(result, point, { evaluation: analysis.evaluation, context: () => session.fixContext(root), pictures }) };
  if (named === undefined) return run;
  const markdown = paragraphs(run?.markdown ?? null, ...named.records.slice(0, namesShown).map((record) => nameHover(analysis, record, pictures)), namesShown < named.records.length && `and ${named.records.length - namesShown} more`);
  return markdown === '' ? null : { span: named.place.span, markdown };
}

/** `D[0..31]` is many names. */
const namesShown = 4;

function nameHover(analysis: Analysis, record: NameRecord, pictures: Pictures): string | null {
  const signal = signalOf(analysis.project, record);
  if (signal !== null) return signalHover(analysis, signal, pictures);
  if (record.kind !== 'run') return wayHover(analysis.evaluation, record, pictures) ?? declarationHover(analysis.project, record);
  const result = analysis.evaluation.runs.find(({ run }) => run.name === record.name);
  return result === undefined ? null : runHover(result, pictures);
}

function signalOf({ nets, pairs }: Project, { kind, name }: NameRecord): Net | Pair | null {
  return (kind === 'net' ? nets.get(name) : kind === 'pair' ? pairs.get(name) : undefined) ?? null;
}

/** The rule that a waiver names. */
function ruleAt(statements: readonly Statement[], offset: number): HoverAnswer | null {
  for (const { span, values, block } of statements) {
    if (offset < span.start || span.end < offset) continue;
    const value = values.find(({ role, span: at }) => role === 'rule' && at.start <= offset && offset <= at.end);
    const rule = value?.kind === 'word' || value?.kind === 'name' ? rules.find(({ name }) => name === (value.kind === 'word' ? value.word : value.name)) : undefined;
    if (value !== undefined && rule !== undefined) return { span: { start: value.span.start, end: value.span.end }, markdown: rulePage(rule) };
    const inner = block === null ? null : ruleAt(block.statements, offset);
    if (inner !== null) return inner;
  }
  return null;
}
