import { comparisonPage } from '../service/comparison/comparisonPage';
import type { RevisionFile } from '../service/comparison/revision';
import { compareMethod, type CompareAnswer, type CompareParams } from './messages';
import { folderOf } from './paths';
import type { Server } from './server';

export function answerCompare({ connection, guard, documents }: Server): void {
  const { paths, session } = documents;
  const fault: CompareAnswer = { refused: 'The comparison failed; the output of Quietrun says where.' };
  connection.onRequest<CompareAnswer, void>(compareMethod, guard('compare', fault, async ({ uri, name, before }: CompareParams, token): Promise<CompareAnswer> => {
    const file = await documents.known(uri);
    if (file === null) return { refused: `${name} is not a board that is open.` };
    const root = before.root === null ? null : paths.keyOf(before.root);
    if (root === null && before.root !== null) return { refused: `${before.name} is not a file.` };
    const boards = root !== null
      ? [{ root: file.path, before: root, title: { before: before.name, after: name } }]
      : session.projectsOf(file.path).map((path) => ({ root: path, before: path, title: titleOf(path, before.name) }));
    const files = before.files.flatMap(({ uri: of, answer }): RevisionFile[] => {
      const path = paths.keyOf(of);
      return path === null ? [] : [{ path, answer: 'text' in answer ? answer : { problem: answer.problem, ...(answer.spelling === undefined ? {} : { actual: answer.spelling }) } }];
    });
    // What a board may use lies around it, now as then; what lies elsewhere is not even asked for.
    const around = (path: string) => paths.foldersAround(path, boards.map((board) => board.before));
    for (;;) {
      const steps = comparisonPage(session, { boards, files });
      let step = steps.next();
      for (; step.done !== true && !token.isCancellationRequested; step = steps.next()) await new Promise((resolve) => setTimeout(resolve, 0));
      if (step.done !== true) return { refused: 'The comparison was stopped.' };
      const answer = step.value;
      if (!('missing' in answer)) return answer;
      const refused = answer.missing.filter((path) => around(path).length === 0);
      if (refused.length === 0) return { missing: answer.missing.map((path) => ({ uri: paths.uriOf(path), inside: around(path).map((folder) => paths.uriOf(folder)) })) };
      files.push(...refused.map((path) => ({ path, answer: { problem: 'outside' as const } })));
    }
  }));
}

/** `valve.quiet at 4e7e064`. */
function titleOf(path: string, revision: string): { readonly before: string; readonly after: string } {
  const name = path.slice(folderOf(path).length);
  return { before: `${name} at ${revision}`, after: name };
}
