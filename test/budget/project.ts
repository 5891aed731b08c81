import { resolveProject } from '../../server/src/board/project';
import type { Project } from '../../server/src/board/model';
import { parse } from '../../server/src/syntax/parse';

/** The project of one file. */
export function projectOf(text: string): Project {
  return resolveProject('board.quiet', { read: (path) => (path === 'board.quiet' ? { tree: parse(text) } : { problem: 'missing' }) });
}
