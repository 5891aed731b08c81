/**
 * The texts that are open or were read, and what has been made of them: the one state of the façade.
 *
 * Whoever owns the files hands their text in by key and asks `missing` which further ones are wanted;
 * the session reads nothing itself. What it answers is a function of the texts alone: trees are kept
 * for each text, analyses until a text that they rest on changes, solutions for as long as they fit.
 */
import { usesOf } from '../board/closure';
import type { Project } from '../board/model';
import { resolveProject } from '../board/project';
import type { SourceAnswer, SourceProblem, Sources } from '../board/sources';
import { usePath } from '../board/usePath';
import { evaluate } from '../budget/evaluate';
import type { Evaluation } from '../budget/results';
import { createSolveCache } from '../budget/solveCache';
import { boundedAtOnce, overTolerances } from '../budget/tolerances/overTolerances';
import { tolerancedQuantities } from '../budget/tolerances/tolerances';
import { comparisonOf } from '../compare/compare';
import type { FixContext } from '../fixes/fix';
import { findingsOf } from '../rules/index';
import type { Finding } from '../rules/rule';
import { spacingOf, type SpacingOptions } from '../spacing/spacing';
import { parse } from '../syntax/parse';
import type { SourceTree } from '../syntax/tree';
import type { Edit } from './answers';
import { editedText } from './editedText';

export interface Analysis {
  readonly project: Project;
  readonly evaluation: Evaluation;
  readonly findings: readonly Finding[];
  /** Its bounds over the tolerances are known. */
  readonly bounded: boolean;
}

/** What is known of one key: a text and, once asked for, its tree; or why there is none. */
type File = { readonly text: string; tree: SourceTree | null; targets: readonly string[] | null } | SourceProblem;

/** A project, the files that it was made of, and what was computed from it so far. */
interface Resolved {
  readonly project: Project;
  readonly read: ReadonlyMap<string, File | undefined>;
  analysis: Analysis | null;
}

export interface SessionOptions {
  /** Is told of a fault in a rule, besides the finding that reports it. */
  readonly log?: (rule: string, error: unknown) => void;
}

export class Session {
  private readonly files = new Map<string, File>();
  private readonly resolved = new Map<string, Resolved>();
  private readonly cache = createSolveCache();

  constructor(private readonly options: SessionOptions = {}) {}

  setText(path: string, text: string): void {
    const known = this.files.get(path);
    if (known !== undefined && 'text' in known && known.text === text) return;
    this.files.set(path, { text, tree: null, targets: null });
  }

  /** Says that a wanted file cannot be had: it is no longer `missing`. */
  setProblem(path: string, problem: SourceProblem): void {
    const known = this.files.get(path);
    if (known !== undefined && 'problem' in known && known.problem === problem.problem && known.actual === problem.actual) return;
    this.files.set(path, { problem: problem.problem, ...(problem.actual === undefined ? {} : { actual: problem.actual }) });
    this.resolved.delete(path);
  }

  /** As if the key had never been spoken of; where a project uses it, it is `missing` again. */
  forget(path: string): void {
    this.files.delete(path);
    this.resolved.delete(path);
  }

  text(path: string): string | undefined {
    const file = this.files.get(path);
    return file !== undefined && 'text' in file ? file.text : undefined;
  }

  tree(path: string): SourceTree | undefined {
    const file = this.files.get(path);
    return file !== undefined && 'text' in file ? (file.tree ??= parse(file.text)) : undefined;
  }

  /** Every file with a text. */
  paths(): readonly string[] {
    return [...this.files].flatMap(([path, file]) => ('text' in file ? [path] : []));
  }

  /**
   * Files that no other one uses. Files that only use each other in a circle have none before them: the
   * first of them by name stands for all.
   */
  roots(): readonly string[] {
    const paths = [...this.paths()].sort();
    const used = new Set(paths.flatMap((path) => this.targetsOf(path).filter((target) => target !== path)));
    const roots = paths.filter((path) => !used.has(path));
    const reached = new Set(roots.flatMap((root) => [...this.reachedFrom(root)]));
    for (const path of paths) {
      if (reached.has(path)) continue;
      roots.push(path);
      for (const other of this.reachedFrom(path)) reached.add(other);
    }
    return roots.sort();
  }

  /** The roots of which the project holds this file. */
  projectsOf(path: string): readonly string[] {
    return this.roots().filter((root) => root === path || this.reachedFrom(root).has(path));
  }

  /** Files that projects use and of which nothing has been said yet. */
  missing(): readonly string[] {
    const wanted = new Set<string>();
    for (const root of this.roots()) for (const path of this.resolve(root).read.keys()) if (!this.files.has(path)) wanted.add(path);
    return [...wanted];
  }

  /** The board that a root describes: names and values, nothing computed. */
  project(root: string): Project {
    return this.resolve(root).project;
  }

  analyse(root: string): Analysis {
    const resolved = this.resolve(root);
    return (resolved.analysis ??= this.analysisOf(resolved.project));
  }

  /**
   * Carries the tolerances through an analysis, one step at a time, and answers whether anything came of it: not where that was
   * done before, or where a text that it rests on has changed meanwhile.
   */
  *carryTolerances(root: string): Generator<null, boolean> {
    const resolved = this.resolve(root);
    const { bounded, evaluation } = this.analyse(root);
    if (bounded) return false;
    const steps = overTolerances(resolved.project, evaluation, this.cache);
    for (;;) {
      const step = steps.next();
      if (this.resolve(root) !== resolved) return false;
      if (step.done === true) {
        resolved.analysis = { project: resolved.project, evaluation: step.value, findings: findingsOf(step.value, this.options), bounded: true };
        return true;
      }
      yield null;
    }
  }

  /** With the tolerances, however long it takes. */
  analyseFully(root: string): Analysis {
    const steps = this.carryTolerances(root);
    while (steps.next().done !== true);
    return this.analyse(root);
  }

  /** What layout needs of a root's board; see `spacing/`. */
  spacing(root: string, options: SpacingOptions): ReturnType<typeof spacingOf> {
    return spacingOf(this.analyse(root).evaluation, this.cache, options);
  }

  /** What a root's board has become since its files were these; see `compare/`. */
  comparison(root: string, before: readonly SourceTree[]): ReturnType<typeof comparisonOf> {
    return comparisonOf(before, this.trees(root), this.cache);
  }

  /** Of every file of a root's project that has a text. */
  trees(root: string): readonly SourceTree[] {
    return this.project(root).files.flatMap((path) => this.tree(path) ?? []);
  }

  /** Of every project that the file belongs to; what two projects say alike is said once. */
  findings(path: string): readonly Finding[] {
    const found = new Map<string, Finding>();
    for (const root of this.projectsOf(path)) {
      for (const finding of this.analyse(root).findings) {
        const { at, rule, severity, message, waived } = finding;
        if (at.path !== path) continue;
        const identity = JSON.stringify([at.span.start, at.span.end, rule, severity, message, waived]);
        if (!found.has(identity)) found.set(identity, finding);
      }
    }
    return [...found.values()].sort((a, b) => a.at.span.start - b.at.span.start);
  }

  /** What a fix of this root's findings works with. */
  fixContext(root: string): FixContext {
    const { project, evaluation } = this.analyse(root);
    return {
      project,
      evaluation,
      text: (path) => this.text(path) ?? '',
      evaluateWith: (edits) => this.evaluateWith(root, edits),
      evaluateProject: (changed) => evaluate(changed, this.cache),
    };
  }

  /** The root as it would be after the edits, which stay undone. */
  evaluateWith(root: string, edits: readonly Edit[]): Evaluation {
    const project = this.projectWith(root, edits);
    const nominal = evaluate(project, this.cache);
    // Compared with what is known now: with its bounds where those are.
    return this.analyse(root).bounded ? boundedAtOnce(project, nominal, this.cache) : nominal;
  }

  /** The same, names and values only. */
  projectWith(root: string, edits: readonly Edit[]): Project {
    const changed = new Map<string, SourceTree>();
    for (const path of new Set(edits.map((edit) => edit.path))) {
      changed.set(path, parse(editedText(this.text(path) ?? '', edits.filter((edit) => edit.path === path))));
    }
    return resolveProject(root, {
      read: (path) => {
        const tree = changed.get(path);
        return tree === undefined ? this.answer(path) : { tree };
      },
    });
  }

  private analysisOf(project: Project): Analysis {
    const nominal = evaluate(project, this.cache);
    // Without tolerances the bounds cost nothing.
    const bounded = tolerancedQuantities(project).length === 0;
    const evaluation = bounded ? boundedAtOnce(project, nominal, this.cache) : nominal;
    return { project, evaluation, findings: findingsOf(evaluation, this.options), bounded };
  }

  private resolve(root: string): Resolved {
    const known = this.resolved.get(root);
    if (known !== undefined && [...known.read].every(([path, file]) => this.files.get(path) === file)) return known;
    const read = new Map<string, File | undefined>();
    const sources: Sources = {
      read: (path) => {
        read.set(path, this.files.get(path));
        return this.answer(path);
      },
    };
    const resolved: Resolved = { project: resolveProject(root, sources), read, analysis: null };
    this.resolved.set(root, resolved);
    return resolved;
  }

  private answer(path: string): SourceAnswer {
    const tree = this.tree(path);
    if (tree !== undefined) return { tree };
    const file = this.files.get(path);
    return file === undefined || 'text' in file ? { problem: 'unread' } : file;
  }

  /** Files that the text names after `use`, there or not. */
  private targetsOf(path: string): readonly string[] {
    const file = this.files.get(path);
    if (file === undefined || !('text' in file)) return [];
    return (file.targets ??= usesOf((file.tree ??= parse(file.text))).flatMap((use) => {
      const joined = usePath(path, use.text);
      return 'path' in joined ? [joined.path] : [];
    }));
  }

  private reachedFrom(root: string): ReadonlySet<string> {
    const reached = new Set([root]);
    for (const path of reached) for (const target of this.targetsOf(path)) reached.add(target);
    return reached;
  }
}
