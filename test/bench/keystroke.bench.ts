/**
 * What one keystroke costs on a board of 300 runs: each step of the way from text to findings, then what an
 * editor asks for next. Every measurement makes an edit that was never made before.
 */
import { evaluate } from '../../server/src/budget/evaluate';
import { createSolveCache } from '../../server/src/budget/solveCache';
import type { Project } from '../../server/src/board/model';
import { resolveProject } from '../../server/src/board/project';
import { findingsOf } from '../../server/src/rules/index';
import { fixesFor } from '../../server/src/fixes/index';
import { hints } from '../../server/src/service/hints';
import { hover } from '../../server/src/service/hover';
import { Session } from '../../server/src/service/session';
import { parse } from '../../server/src/syntax/parse';
import { seeded } from '../support/generatedBoard';
import { largeBoard } from './largeBoard';

const path = 'large.quiet';
const random = seeded(7);
const { text, gaps } = largeBoard(300);

/** One gap somewhere, another length of text half of the time. */
function editedGap(): { readonly edited: string; readonly at: number } {
  const { start, end } = random.pick(gaps);
  const number = random.between(0.15, 1.2).toFixed(random.chance(0.5) ? 4 : 6);
  return { edited: text.slice(0, start) + number + text.slice(end), at: start };
}

function projectOf(source: string): Project {
  const tree = parse(source);
  return resolveProject(path, { read: () => ({ tree }) });
}

const cache = createSolveCache();
evaluate(projectOf(text), cache);

const session = new Session();
session.setText(path, text);
session.analyse(path);

function keystroke(): number {
  const { edited, at } = editedGap();
  session.setText(path, edited);
  return at;
}

/** What an editor shows at once around the edit. */
function screenAt(at: number) {
  return { start: at - 750, end: at + 750 };
}

/** The same screen as before the edit, shown and searched through already. */
function shownBefore(): number {
  session.setText(path, text);
  const { edited, at } = editedGap();
  hints(session, path, screenAt(at));
  session.setText(path, edited);
  session.analyse(path);
  return at;
}

function failing() {
  const at = keystroke();
  const failingOnes = session.analyse(path).findings.filter(({ rule }) => rule === 'over-budget');
  return failingOnes.reduce((nearest, finding) => (Math.abs(finding.at.span.start - at) < Math.abs(nearest.at.span.start - at) ? finding : nearest));
}

export const cases = [
  { name: 'parse', prepare: editedGap, run: ({ edited }: { edited: string }) => parse(edited) },
  { name: 'resolve', prepare: () => parse(editedGap().edited), run: (tree: ReturnType<typeof parse>) => resolveProject(path, { read: () => ({ tree }) }) },
  { name: 'evaluate', prepare: () => projectOf(editedGap().edited), run: (project: Project) => evaluate(project, cache) },
  { name: 'evaluate what is known', prepare: () => projectOf(text), run: (project: Project) => evaluate(project, cache) },
  { name: 'findings', prepare: () => evaluate(projectOf(editedGap().edited), cache), run: findingsOf },
  { name: 'edit to findings', prepare: editedGap, run: ({ edited }: { edited: string }) => { session.setText(path, edited); return session.findings(path); } },
  { name: 'hover after it', prepare: () => { const at = keystroke(); session.analyse(path); return at; }, run: (at: number) => hover(session, path, at) },
  { name: 'hints of the screen after it', prepare: shownBefore, run: (at: number) => hints(session, path, screenAt(at)) },
  { name: 'hints of a screen never shown', prepare: () => { const at = keystroke(); session.analyse(path); return at; }, run: (at: number) => hints(session, path, screenAt(at)) },
  { name: 'fixes of one finding after it', prepare: failing, run: (finding: ReturnType<typeof failing>) => fixesFor(finding, session.fixContext(path)) },
];
