/**
 * A root and every file that it uses, directly or not, each once, nearest first.
 *
 * Breadth first, so that a file's depth is that of its shortest way from the root and does not depend on
 * the order of `use`. A cycle does no harm to reading, since each file is read once; it is a finding.
 */
import type { SourceTree, StringValue } from '../syntax/tree';
import type { BoardError, Include, Place } from './model';
import { sourceLimits, type SourceProblem, type Sources } from './sources';
import { usePath } from './usePath';

export interface ProjectFile {
  readonly path: string;
  readonly tree: SourceTree;
}

export interface Closure {
  readonly files: readonly ProjectFile[];
  readonly includes: readonly Include[];
  readonly errors: readonly BoardError[];
  /** Each `use` whose file's content is not in `files`. */
  readonly unread: readonly Place[];
}

interface Edge {
  readonly place: Place;
  readonly to: string;
}

export function closureOf(root: string, sources: Sources): Closure {
  const files: ProjectFile[] = [];
  const includes: Include[] = [];
  const errors: BoardError[] = [];
  const unread: Place[] = [];
  const edges = new Map<string, Edge[]>();
  const answers = new Map<string, SourceProblem | 'read'>();

  const refuse = (place: Place, message: string, correction?: string) => {
    const corrections = correction === undefined ? [] : [{ title: `Change to ${quoted(correction)}`, place, newText: quoted(correction) }];
    errors.push({ rule: 'include', place, message, related: [], corrections });
  };
  const read = (path: string): SourceProblem | 'read' => {
    const known = answers.get(path);
    if (known !== undefined) return known;
    const answer = sources.read(path);
    const outcome = 'problem' in answer ? answer : 'read';
    answers.set(path, outcome);
    if ('tree' in answer) files.push({ path, tree: answer.tree });
    return outcome;
  };

  const first = read(root);
  if (first !== 'read') {
    const place = { path: root, span: { start: 0, end: 0 } };
    unread.push(place);
    if (first.problem !== 'unread') refuse(place, problemText(root, first));
  }
  let depth = 0;
  for (let begin = 0, end = files.length; begin < end; begin = end, end = files.length, depth += 1) {
    for (const file of files.slice(begin, end)) {
      const outgoing: Edge[] = [];
      edges.set(file.path, outgoing);
      for (const use of usesOf(file.tree)) {
        const place = { path: file.path, span: use.span };
        const joined = usePath(file.path, use.text);
        const target = 'path' in joined ? joined.path : null;
        includes.push({ place, path: target });
        if ('problem' in joined) {
          unread.push(place);
          refuse(place, joinText(use.text, joined.problem), joined.problem === 'backslash' ? use.text.replaceAll('\\', '/') : undefined);
          continue;
        }
        const isNew = !answers.has(joined.path);
        if (isNew && (sourceLimits.depth <= depth || sourceLimits.files <= files.length)) {
          unread.push(place);
          refuse(place, depth < sourceLimits.depth ? `a project has at most ${sourceLimits.files} files; ${quoted(use.text)} is one more` : `${quoted(use.text)} is more than ${sourceLimits.depth} files away from ${lastPart(root)}`);
          continue;
        }
        const outcome = read(joined.path);
        if (outcome === 'read') {
          outgoing.push({ place, to: joined.path });
          continue;
        }
        unread.push(place);
        if (outcome.problem === 'unread') continue;
        const actual = outcome.actual === undefined ? undefined : respelt(use.text, outcome.actual);
        refuse(place, problemText(use.text, { problem: outcome.problem, ...(actual === undefined ? {} : { actual }) }), actual);
      }
    }
  }
  errors.push(...cycles(root, edges));
  return { files, includes, errors, unread };
}

export function usesOf(tree: SourceTree): readonly StringValue[] {
  return tree.statements.flatMap((statement) => (statement.keyword === 'use' ? statement.values.filter((value) => value.kind === 'string') : []));
}

/** One finding for each `use` that closes a cycle. */
function cycles(root: string, edges: ReadonlyMap<string, readonly Edge[]>): BoardError[] {
  const errors: BoardError[] = [];
  const finished = new Set<string>();
  const way: { readonly path: string; readonly by: Edge | null }[] = [];
  const onTheWay = new Map<string, number>();
  const visit = (path: string, by: Edge | null) => {
    onTheWay.set(path, way.length);
    way.push({ path, by });
    for (const edge of edges.get(path) ?? []) {
      const from = onTheWay.get(edge.to);
      if (from !== undefined) {
        const round = way.slice(from);
        const names = [...round.map((step) => lastPart(step.path)), lastPart(edge.to)];
        errors.push({
          rule: 'include', place: edge.place, corrections: [],
          message: round.length === 1 ? `${names[0]} uses itself` : `${names.slice(0, -1).join(' uses ')} uses ${names[names.length - 1]} again`,
          related: round.slice(1).map((step) => ({ place: step.by!.place, message: `${lastPart(step.path)} is used here` })),
        });
      } else if (!finished.has(edge.to)) visit(edge.to, edge);
    }
    finished.add(path);
    onTheWay.delete(path);
    way.pop();
  };
  visit(root, null);
  return errors;
}

function joinText(written: string, problem: 'empty' | 'backslash' | 'absolute' | 'outside'): string {
  switch (problem) {
    case 'empty': return 'a path is missing: one relative to this file, such as "common/stackup.quiet"';
    case 'backslash': return `paths are written with "/": ${quoted(written.replaceAll('\\', '/'))}`;
    case 'absolute': return `${quoted(written)} is not relative to this file`;
    case 'outside': return `${quoted(written)} lies outside the workspace folder`;
  }
}

/** The written path in the letters of the file system, which knows the file from another folder. */
function respelt(written: string, actual: string): string {
  const [parts, spelt] = [written.split('/'), actual.split('/')];
  for (let back = 1; back <= Math.min(parts.length, spelt.length); back += 1) {
    if (parts[parts.length - back].toLowerCase() !== spelt[spelt.length - back].toLowerCase()) break;
    parts[parts.length - back] = spelt[spelt.length - back];
  }
  return parts.join('/');
}

function problemText(written: string, { problem, actual }: SourceProblem): string {
  switch (problem) {
    case 'missing': return `there is no file ${quoted(written)}`;
    case 'outside': return `${quoted(written)} lies outside the workspace folder`;
    case 'case': return actual === undefined ? `${quoted(written)} differs from the file's name in case` : `${quoted(written)} differs in case from the file's name, ${quoted(actual)}`;
    case 'too-large': return `${quoted(written)} is larger than 8 MiB`;
    case 'unread': return `${quoted(written)} has not been read`;
  }
}

const quoted = (text: string) => `"${(120 < text.length ? `${text.slice(0, 117)}…` : text).replaceAll('"', '""')}"`;
const lastPart = (path: string) => path.slice(path.lastIndexOf('/') + 1);
