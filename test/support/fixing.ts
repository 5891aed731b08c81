/** A fix context over texts in memory, as the editor's session makes one over its documents. */
import { evaluate } from '../../server/src/budget/evaluate';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { editedText } from '../../server/src/service/editedText';
import type { Edit, FixContext } from '../../server/src/fixes/fix';
import { evaluated, rootPath, type Evaluated, type Texts } from './evaluated';

export function fixing(texts: Texts, cache: SolveCache = createSolveCache(), root = rootPath): Evaluated & { readonly context: FixContext } {
  const board = evaluated(texts, cache, root);
  const context: FixContext = {
    project: board.project,
    evaluation: board.evaluation,
    text: (path) => texts.get(path)!,
    evaluateWith: (edits) => evaluated(withEdits(texts, edits), cache, root).evaluation,
    evaluateProject: (project) => evaluate(project, cache),
  };
  return { ...board, context };
}

export function withEdits(texts: Texts, edits: readonly Edit[]): Texts {
  return new Map([...texts].map(([path, text]) => [path, editedText(text, edits.filter((edit) => edit.path === path))]));
}
