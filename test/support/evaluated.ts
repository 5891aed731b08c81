/** From the texts of a board to what is found in it, by the same rooms that the editor goes through. */
import { resolveProject } from '../../server/src/board/project';
import type { Project } from '../../server/src/board/model';
import type { Sources } from '../../server/src/board/sources';
import { evaluate } from '../../server/src/budget/evaluate';
import type { Evaluation } from '../../server/src/budget/results';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { findingsOf } from '../../server/src/rules/index';
import type { Finding } from '../../server/src/rules/rule';
import { parse } from '../../server/src/syntax/parse';

export type Texts = ReadonlyMap<string, string>;

export interface Evaluated {
  readonly project: Project;
  readonly evaluation: Evaluation;
  readonly findings: readonly Finding[];
}

export const rootPath = 'board.quiet';

export function evaluated(texts: Texts, cache: SolveCache = createSolveCache(), root = rootPath): Evaluated {
  const project = resolveProject(root, sourcesOf(texts));
  const evaluation = evaluate(project, cache);
  const findings = findingsOf(evaluation, { log: (rule, error) => { throw new Error(`${rule} failed`, { cause: error }); } });
  return { project, evaluation, findings };
}

export function sourcesOf(texts: Texts): Sources {
  return {
    read: (path) => {
      const text = texts.get(path);
      return text === undefined ? { problem: 'missing' } : { tree: parse(text) };
    },
  };
}
