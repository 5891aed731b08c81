/**
 * Findings, in the one way that suits the client: it asks for them (pull), or they are sent (push).
 * Never both, which would show each twice.
 */
import { DocumentDiagnosticReportKind, LSPErrorCodes, ResponseError, type CancellationToken, type Connection, type Diagnostic, type DocumentDiagnosticReport, type WorkspaceDiagnosticParams, type WorkspaceDiagnosticReport } from 'vscode-languageserver';
import { diagnosticOf, type FindingsToShow } from './findings';
import { guarded, Superseded } from './guard';
import { remindOfOverlooked } from './overlooked';
import type { Refresher } from './refresh';
import { textHash } from './textHash';

export interface DiagnosticsOptions extends FindingsToShow {
  readonly connection: Connection;
  /** After the findings of a file were computed. */
  readonly computed: (path: string) => void;
}

/** "Content modified" would be taken for "no findings", and they would flicker. */
const overtaken = new ResponseError(LSPErrorCodes.ServerCancelled, 'the text has changed since', { retriggerRequest: true });

export function answerPulls(options: DiagnosticsOptions, refresher: Pick<Refresher, 'findings'>): void {
  const { connection, documents, computed } = options;
  const overlooked = remindOfOverlooked(documents, () => refresher.findings());
  connection.languages.diagnostics.on(guarded({
    connection,
    name: 'diagnostics',
    async answer({ textDocument, previousResultId }): Promise<DocumentDiagnosticReport> {
      overlooked.asked(textDocument.uri);
      const file = await documents.known(textDocument.uri); // a client asks once more when it has closed a file
      const items = file === null ? [] : diagnosticsOf(file.path, options);
      if (file !== null) computed(file.path);
      const resultId = textHash(JSON.stringify(items));
      return resultId === previousResultId ? { kind: DocumentDiagnosticReportKind.Unchanged, resultId } : { kind: DocumentDiagnosticReportKind.Full, resultId, items };
    },
    overtaken,
    otherwise: (fault) => ({ kind: DocumentDiagnosticReportKind.Full, items: [faultDiagnostic(fault)] }),
  }));
  connection.languages.diagnostics.onWorkspace(guarded({
    connection,
    name: 'workspace diagnostics',
    answer: (params, token) => workspaceReport(params, token, options),
    overtaken,
    otherwise: () => ({ items: [] }),
  }));
}

/** Sends the findings of every open file a moment after the last change. */
export function pushFindings(options: DiagnosticsOptions, refresher: Pick<Refresher, 'onNow'>): void {
  const { connection, documents, computed } = options;
  const shown = new Set<string>();
  let due: ReturnType<typeof setTimeout> | undefined;
  const send = async () => {
    await documents.settle();
    const open = new Set(documents.openPaths());
    for (const path of [...shown].filter((each) => !open.has(each))) {
      shown.delete(path);
      await connection.sendDiagnostics({ uri: documents.paths.uriOf(path), diagnostics: [] });
    }
    for (const path of open) {
      const version = documents.versionOf(path);
      const diagnostics = guardedDiagnostics(path, options);
      if (version === null) continue;
      shown.add(path);
      await connection.sendDiagnostics({ uri: documents.paths.uriOf(path), version, diagnostics });
      computed(path);
    }
  };
  const soon = () => {
    clearTimeout(due);
    due = setTimeout(() => void send().catch((error) => connection.console.error(`diagnostics: ${String(error)}`)), 60);
  };
  documents.onChange(soon);
  refresher.onNow(soon);
}

function diagnosticsOf(path: string, options: FindingsToShow): Diagnostic[] {
  const document = options.documents.textOf(path);
  return document === null ? [] : options.documents.session.findings(path).map((finding) => diagnosticOf(finding, document, options));
}

function guardedDiagnostics(path: string, options: DiagnosticsOptions): Diagnostic[] {
  try {
    return diagnosticsOf(path, options);
  } catch (error) {
    options.connection.console.error(`diagnostics: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`);
    return [faultDiagnostic(error)];
  }
}

/** A file that could not be checked must not look like one without findings. */
function faultDiagnostic(fault: unknown): Diagnostic {
  const words = fault instanceof Error ? fault.message : String(fault);
  return { range: { start: { line: 0, character: 0 }, end: { line: 0, character: 1 } }, severity: 1, source: 'quietrun', message: `This file was not checked, for a fault in Quietrun itself: ${words}. Its output has the details.` };
}

/** After an edit, files that no one has open can wait this long. */
const patience = 400;

/**
 * The files that no one has open. The client asks again as soon as it is answered, so the answer waits
 * until there is something new to say; an idle editor costs nothing.
 */
async function workspaceReport({ previousResultIds }: WorkspaceDiagnosticParams, token: CancellationToken, options: DiagnosticsOptions): Promise<WorkspaceDiagnosticReport> {
  const { documents } = options;
  const known = new Map(previousResultIds.map(({ uri, value }) => [documents.paths.keyOf(uri), value]));
  for (;;) {
    await documents.settle();
    const items: WorkspaceDiagnosticReport['items'] = [];
    const open = new Set(documents.openPaths());
    for (const path of documents.session.paths().filter((each) => !open.has(each))) {
      if (token.isCancellationRequested) throw new Superseded();
      const found = guardedDiagnostics(path, options);
      const resultId = textHash(JSON.stringify(found));
      if ((known.get(path) ?? textHash('[]')) !== resultId) items.push({ kind: DocumentDiagnosticReportKind.Full, uri: documents.paths.uriOf(path), version: null, resultId, items: found });
      // One file at a time: a request for the file in view must not wait for all the others.
      await new Promise((resolve) => setTimeout(resolve, 0));
    }
    if (0 < items.length) return { items };
    await nextChange(options, token);
    await new Promise((resolve) => setTimeout(resolve, patience));
  }
}

function nextChange({ documents }: DiagnosticsOptions, token: CancellationToken): Promise<void> {
  return new Promise((resolve) => {
    const stop = documents.onChange(done);
    const cancelled = token.onCancellationRequested(done);
    function done() {
      stop();
      cancelled.dispose();
      resolve();
    }
  });
}
