/**
 * Edits of a fix, extended so that what was formatted stays formatted: a row that is put into a run stands in its columns. Among lines
 * that were not, only what is put there is set; they, and lines far from the edits, stay as they are.
 */
import { formatEdits, type SpaceEdit } from '../syntax/format/formatEdits';
import { groupsTouching } from '../syntax/format/groups';
import { parse } from '../syntax/parse';
import type { SourceTree, Span } from '../syntax/tree';
import type { Edit, Fix } from './answers';
import { editedText } from './editedText';
import type { Session } from './session';

export function tidyFix(fix: Fix, session: Session): Fix {
  return { ...fix, edits: tidyEdits(fix.edits, (path) => session.tree(path)) };
}

export function tidyEdits(edits: readonly Edit[], treeOf: (path: string) => SourceTree | undefined): readonly Edit[] {
  const byPath = new Map<string, Edit[]>();
  for (const edit of edits) {
    const known = byPath.get(edit.path);
    if (known === undefined) byPath.set(edit.path, [edit]);
    else known.push(edit);
  }
  return [...byPath].flatMap(([path, own]) => {
    const tree = treeOf(path);
    return tree === undefined ? own : tidyFile(tree, path, own);
  });
}

function tidyFile(before: SourceTree, path: string, edits: readonly Edit[]): readonly Edit[] {
  const made = placesAfter(edits);
  const after = parse(editedText(before.text, edits));
  const untidy = unformattedIn(before, edits.map(({ span }) => span));
  const spaces = unformattedIn(after, made.map(({ after: span }) => span));
  const wanted = untidy.length === 0 ? spaces : spaces.filter(({ span }) => made.some(({ after: own }) => own.start <= span.start && span.end <= own.end));
  return wanted.length === 0 ? edits : joined(after.text, { path, made, spaces: wanted });
}

function unformattedIn(tree: SourceTree, spans: readonly Span[]): readonly SpaceEdit[] {
  const groups = groupsTouching(tree, spans);
  return formatEdits(tree).filter(({ span }) => groups.some(({ start, end }) => start <= span.start && span.end <= end));
}

/** An edit, with where what it puts there lies in the text that comes of all. */
interface Made {
  readonly before: Span;
  readonly after: Span;
}

function placesAfter(edits: readonly Edit[]): readonly Made[] {
  let shift = 0;
  return [...edits].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end).map(({ span, newText }) => {
    const start = span.start + shift;
    shift += newText.length - (span.end - span.start);
    return { before: span, after: { start, end: start + newText.length } };
  });
}

/** Both in one step. What touches each other becomes one edit. */
function joined(after: string, { path, made, spaces }: { readonly path: string; readonly made: readonly Made[]; readonly spaces: readonly SpaceEdit[] }): readonly Edit[] {
  const clusters: { start: number; end: number }[] = [];
  for (const { start, end } of [...made.map((each) => each.after), ...spaces.map(({ span }) => span)].sort((a, b) => a.start - b.start || a.end - b.end)) {
    const last = clusters.at(-1);
    if (last !== undefined && start <= last.end) last.end = Math.max(last.end, end);
    else clusters.push({ start, end });
  }
  return clusters.map(({ start, end }) => {
    const grown = (isBefore: (each: Made) => boolean) => made.filter(isBefore).reduce((sum, each) => sum + each.after.end - each.after.start - (each.before.end - each.before.start), 0);
    const within = spaces.filter(({ span }) => start <= span.start && span.end <= end).map(({ span, newText }) => ({ path, span: { start: span.start - start, end: span.end - start }, newText }));
    return {
      path,
      span: { start: start - grown((each) => each.after.end < start), end: end - grown((each) => each.after.end <= end) },
      newText: editedText(after.slice(start, end), within),
    };
  });
}
