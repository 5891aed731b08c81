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
  const growing: Growing = { root, sources, files: [], includes: [], errors: [], unread: [], edges: new Map(), answers: new Map() };
  const first = read(growing, root);
  if (first !== 'read') lack(growing, { path: root, span: { start: 0, end: 0 } }, root, first);
  let depth = 0;
  for (let begin = 0, end = growing.files.length; begin < end; begin = end, end = growing.files.length, depth += 1) {
    for (const file of growing.files.slice(begin, end)) {
      const outgoing = usesOf(file.tree).flatMap((use) => followUse(growing, file, use, depth) ?? []);
      growing.edges.set(file.path, outgoing);
    }
  }
  const { files, includes, errors, unread, edges } = growing;
  return { files, includes, errors: [...errors, ...cycles(root, edges)], unread };
}

/** A closure while it is being read. */
interface Growing {
  readonly root: string;
  readonly sources: Sources;
  readonly files: ProjectFile[];
  readonly includes: Include[];
  readonly errors: BoardError[];
  readonly unread: Place[];
  readonly edges: Map<string, readonly Edge[]>;
  readonly answers: Map<string, SourceProblem | 'read'>;
}

/** Reads the file that a `use` names, unless that has been done; null, and said, where it cannot be had. */
function followUse(growing: Growing, file: ProjectFile, use: StringValue, depth: number): Edge | null {
  const { root, files, includes, unread, answers } = growing;
  const place = { path: file.path, span: use.span };
  const joined = usePath(file.path, use.text);
  includes.push({ place, path: 'path' in joined ? joined.path : null });
  if ('problem' in joined) {
    unread.push(place);
    refuse(growing, place, joinText(use.text, joined.problem), joined.problem === 'backslash' ? use.text.replaceAll('\\', '/') : undefined);
    return null;
  }
  if (!answers.has(joined.path) && (sourceLimits.depth <= depth || sourceLimits.files <= files.length)) {
    unread.push(place);
    refuse(growing, place, depth < sourceLimits.depth ? `a project has at most ${sourceLimits.files} files; ${quoted(use.text)} is one more` : `${quoted(use.text)} is more than ${sourceLimits.depth} files away from ${lastPart(root)}`);
    return null;
  }
  const outcome = read(growing, joined.path);
  if (outcome === 'read') return { place, to: joined.path };
  lack(growing, place, use.text, outcome);
  return null;
}

function read({ sources, files, answers }: Growing, path: string): SourceProblem | 'read' {
  const known = answers.get(path);
  if (known !== undefined) return known;
  const answer = sources.read(path);
  const outcome = 'problem' in answer ? answer : 'read';
  answers.set(path, outcome);
  if ('tree' in answer) files.push({ path, tree: answer.tree });
  return outcome;
}

function lack(growing: Growing, place: Place, written: string, { problem, actual }: SourceProblem): void {
  growing.unread.push(place);
  // What has been asked for and has not arrived is nobody's mistake.
  if (problem === 'unread') return;
  const right = actual === undefined ? undefined : respelt(written, actual);
  refuse(growing, place, problemText(written, { problem, ...(right === undefined ? {} : { actual: right }) }), right);
}

function refuse({ errors }: Growing, place: Place, message: string, correction?: string): void {
  const corrections = correction === undefined ? [] : [{ title: `Change to ${quoted(correction)}`, place, newText: quoted(correction) }];
  errors.push({ rule: 'include', place, message, related: [], corrections });
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
    case 'unreadable': return `${quoted(written)} is no file that can be read`;
    case 'unread': return `${quoted(written)} has not been read`;
  }
}

const quoted = (text: string) => `"${(120 < text.length ? `${text.slice(0, 117)}…` : text).replaceAll('"', '""')}"`;
const lastPart = (path: string) => path.slice(path.lastIndexOf('/') + 1);
