/** What became of the boards of a file since another revision, as one page. */
import type { Session } from '../session';
import { comparisonMarkdown, type Title } from './comparisonMarkdown';
import { markdownWord } from '../markdownWord';
import { revisionOf, type RevisionFile } from './revision';

export interface PageOptions {
  /** The boards as they are now, each with the file that it was before and the names of both. */
  readonly boards: readonly { readonly root: string; readonly before: string; readonly title: Title }[];
  readonly files: readonly RevisionFile[];
}

export type ComparisonPage = { readonly missing: readonly string[] } | { readonly markdown: string } | { readonly refused: string };

/** Yields before each evaluation of a board, so that others can be answered in between. */
export function* comparisonPage(session: Session, { boards, files }: PageOptions): Generator<null, ComparisonPage> {
  const pairs = boards.map((board) => ({ ...board, revision: revisionOf(board.before, files) }));
  const missing = pairs.flatMap(({ revision }) => ('missing' in revision ? revision.missing : []));
  if (0 < missing.length) return { missing: [...new Set(missing)] };
  const sections: string[] = [];
  const absent: string[] = [];
  for (const { root, title, revision } of pairs) {
    if (!('trees' in revision)) {
      absent.push('problem' in revision && revision.problem !== 'missing' ? `${title.before} cannot be read (${revision.problem}).` : `There is no ${title.before}.`);
      continue;
    }
    const steps = session.comparison(root, revision.trees);
    let step = steps.next();
    for (; step.done !== true; step = steps.next()) yield null;
    sections.push(comparisonMarkdown(step.value, title) + partly(title, revision.complete, session.project(root).complete));
  }
  if (sections.length === 0) return { refused: absent.join(' ') };
  return { markdown: [...sections, ...absent.map((sentence) => `${markdownWord(sentence)}\n`)].join('\n') };
}

function partly({ before, after }: Title, ...complete: readonly boolean[]): string {
  const names = [before, after].filter((_, side) => !complete[side]).map(markdownWord);
  return names.length === 0 ? '' : `\n${names.join(' and ')} could not be read whole, and ${names.length === 1 ? 'is' : 'are'} compared as far as ${names.length === 1 ? 'it' : 'they'} could.\n`;
}
