/** A board as it was in another revision: made of texts that whoever can reach that revision hands over, and asks for those it lacks. */
import type { SourceProblem } from '../../board/sources';
import type { SourceTree } from '../../syntax/tree';
import { Session } from '../session';

/** A file of the revision, by the session's key. */
export interface RevisionFile {
  readonly path: string;
  readonly answer: { readonly text: string } | SourceProblem;
}

export type Revision =
  | { readonly missing: readonly string[] }
  /** It has no root there. */
  | { readonly problem: SourceProblem['problem'] }
  /** `complete`: it could be read whole. */
  | { readonly trees: readonly SourceTree[]; readonly complete: boolean };

export function revisionOf(root: string, files: readonly RevisionFile[]): Revision {
  const session = new Session();
  for (const { path, answer } of files) {
    if ('text' in answer) session.setText(path, answer.text);
    else session.setProblem(path, answer);
  }
  const first = files.find(({ path }) => path === root);
  if (first === undefined) return { missing: [root] };
  if ('problem' in first.answer) return { problem: first.answer.problem };
  const missing = session.missing();
  return 0 < missing.length ? { missing } : { trees: session.trees(root), complete: session.project(root).complete };
}
