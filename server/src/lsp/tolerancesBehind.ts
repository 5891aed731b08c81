/**
 * Carries tolerances through in the background: what is asked for meanwhile is answered between two steps, and an edit ends it. When it
 * is done, the client is asked to ask anew.
 */
import type { Documents } from './documents';

export interface TolerancesBehind {
  /** The findings of this file were asked for. */
  readonly wanted: (path: string) => void;
}

/** After the last edit: until then every step would be thrown away. */
const pause = 250;
/** Milliseconds at once. */
const atOnce = 8;

export function tolerancesBehind(documents: Documents, failed: (error: unknown) => void, done: () => void): TolerancesBehind {
  const waiting = new Set<string>();
  let due: ReturnType<typeof setTimeout> | undefined;
  let working = false;
  const work = async () => {
    working = true;
    let changed = false;
    try {
      for (const path of waiting) {
        waiting.delete(path);
        for (const root of documents.session.projectsOf(path)) changed = (await carried(documents, root)) || changed;
      }
    } catch (error) {
      failed(error);
    } finally {
      working = false;
    }
    if (changed) done();
    if (0 < waiting.size) later();
  };
  const later = () => {
    clearTimeout(due);
    due = setTimeout(() => { if (!working) void work(); }, pause);
  };
  return {
    wanted: (path) => {
      waiting.add(path);
      later();
    },
  };
}

async function carried({ session }: Documents, root: string): Promise<boolean> {
  const steps = session.carryTolerances(root);
  for (let since = Date.now(); ; ) {
    const step = steps.next();
    if (step.done === true) return step.value;
    if (Date.now() - since < atOnce) continue;
    await new Promise((resolve) => setTimeout(resolve, 0));
    since = Date.now();
  }
}
