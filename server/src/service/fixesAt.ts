/** Quick fixes for the findings that a span of a file touches, in every project that the file belongs to. */
import type { Fix } from '../fixes/fix';
import { fixesFor } from '../fixes/index';
import type { Span } from '../syntax/tree';
import type { Session } from './session';
import { tidyFix } from './tidyEdits';

export function fixesAt(session: Session, path: string, span: Span): readonly Fix[] {
  const found = new Map<string, Fix>();
  for (const root of session.projectsOf(path)) {
    const touched = session.analyse(root).findings.filter(({ at }) => at.path === path && at.span.start <= span.end && span.start <= at.span.end).slice(0, mostFindings);
    const context = touched.length === 0 ? null : session.fixContext(root);
    for (const finding of touched) {
      for (const proposed of fixesFor(finding, context!)) {
        const fix = tidyFix(proposed, session);
        // A receiver and the gap that disturbs it are two findings with one cure, and two projects may share it.
        const identity = JSON.stringify([fix.title, fix.edits]);
        const known = found.get(identity);
        if (known === undefined || (fix.preferred && !known.preferred)) found.set(identity, fix);
      }
    }
  }
  return withOnePreferred([...found.values()]);
}

/** Each is solved for: with all of a file selected, a menu of what begins it is better than a minute's wait. */
const mostFindings = 12;

/** The first of several: an editor applies the preferred one without asking. */
function withOnePreferred(fixes: readonly Fix[]): readonly Fix[] {
  const first = fixes.findIndex(({ preferred }) => preferred);
  return fixes.map((fix, index) => (fix.preferred && index !== first ? { ...fix, preferred: false } : fix));
}
