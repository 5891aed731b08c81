/**
 * Asks the client to ask anew for what it shows. It asks of its own accord about the file that is being
 * edited; it cannot know of a file read again from the disk, nor that one file shows what another says.
 */
import { CodeLensRefreshRequest, type ClientCapabilities, type Connection } from 'vscode-languageserver';
import type { Documents } from './documents';

export interface Refresher {
  /** All that is shown, at once. */
  readonly now: () => void;
  /** The findings alone, at once. */
  readonly findings: () => void;
  /** For findings that are sent, not asked for. */
  readonly onNow: (listener: () => void) => void;
  /** For good: the client will hear no more. */
  readonly stop: () => void;
}

/** Long enough to wait for the end of a word that is being typed. */
const pause = 150;

export function createRefresher(connection: Connection, documents: Documents, capabilities: () => ClientCapabilities): Refresher {
  let due: ReturnType<typeof setTimeout> | undefined;
  const listeners: (() => void)[] = [];
  const failed = (error: unknown) => connection.console.warn(`refresh: ${String(error)}`);
  let stopped = false;
  const findings = () => {
    if (stopped) return;
    if (capabilities().workspace?.diagnostics?.refreshSupport === true) connection.languages.diagnostics.refresh().catch(failed);
  };
  const now = () => {
    if (stopped) return;
    for (const listener of listeners) listener();
    clearTimeout(due);
    due = undefined;
    findings();
    const { workspace } = capabilities();
    if (workspace?.semanticTokens?.refreshSupport === true) connection.languages.semanticTokens.refresh().catch(failed);
    if (workspace?.inlayHint?.refreshSupport === true) connection.languages.inlayHint.refresh().catch(failed);
    if (workspace?.codeLens?.refreshSupport === true) connection.sendRequest(CodeLensRefreshRequest.type).catch(failed);
  };
  documents.onReread(now);
  documents.onEdit((path) => {
    clearTimeout(due);
    due = setTimeout(() => { if (isSeenElsewhere(documents, path)) now(); }, pause);
  });
  return { now, findings, onNow: (listener) => listeners.push(listener), stop: () => { stopped = true; } };
}

/** Another file that is open belongs to a project of this one. */
function isSeenElsewhere(documents: Documents, path: string): boolean {
  const { session } = documents;
  const projects = new Set(session.projectsOf(path));
  return documents.openPaths().some((other) => other !== path && session.projectsOf(other).some((root) => projects.has(root)));
}
