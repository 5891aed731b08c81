/**
 * A client that asks for findings decides itself when to ask. One that is just forgetting a file as it is
 * closed may miss that it was opened anew, and then show what an older text said until the next edit, or
 * for good. An edit that no one has asked about a while later is brought to the client's notice.
 */
import type { Documents } from './documents';

export interface Overlooked {
  /** The findings of this file were asked for. */
  readonly asked: (uri: string) => void;
}

/** Milliseconds after the last edit; the client of VS Code asks within 10. It is told again a few times, as it may be busy forgetting. */
const reminders: readonly number[] = [500, 1500, 4000];

export function remindOfOverlooked(documents: Pick<Documents, 'onEdit' | 'versionOf' | 'paths'>, remind: () => void): Overlooked {
  const unasked = new Set<string>();
  let due: ReturnType<typeof setTimeout> | undefined;
  const later = (count: number) => {
    clearTimeout(due);
    if (count === reminders.length) return unasked.clear();
    due = setTimeout(() => {
      for (const path of unasked) if (documents.versionOf(path) === null) unasked.delete(path);
      if (unasked.size === 0) return;
      remind();
      later(count + 1);
    }, reminders[count] - (reminders[count - 1] ?? 0));
  };
  documents.onEdit((path) => {
    unasked.add(path);
    later(0);
  });
  return {
    asked: (uri) => {
      const path = documents.paths.keyOf(uri);
      if (path !== null) unasked.delete(path);
    },
  };
}
