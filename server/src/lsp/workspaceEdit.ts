/** Edits of the façade as the protocol's, each for the version of its file that it was computed from. */
import { TextDocumentEdit, type ClientCapabilities, type TextEdit, type WorkspaceEdit } from 'vscode-languageserver';
import type { Edit } from '../service/answers';
import type { Documents } from './documents';
import { rangeOf } from './positions';

/** An editor that has moved on refuses it; a client that knows no versions is sent none. */
export function workspaceEdit(edits: readonly Edit[], documents: Documents, { workspace }: ClientCapabilities): WorkspaceEdit {
  const changes = editsByFile(edits, documents);
  if (workspace?.workspaceEdit?.documentChanges === true) return { documentChanges: [...changes].map(([path, of]) => TextDocumentEdit.create({ uri: documents.paths.uriOf(path), version: documents.versionOf(path) }, of)) };
  return { changes: Object.fromEntries([...changes].map(([path, of]) => [documents.paths.uriOf(path), of])) };
}

function editsByFile(edits: readonly Edit[], documents: Documents): ReadonlyMap<string, TextEdit[]> {
  const byPath = new Map<string, TextEdit[]>();
  for (const { path, span, newText } of edits) {
    const document = documents.textOf(path);
    if (document === null) throw new Error(`an edit in ${path}, which is not known`);
    const edit = { range: rangeOf(document, span), newText: withLineEnds(newText, document.getText()) };
    const known = byPath.get(path);
    if (known === undefined) byPath.set(path, [edit]);
    else known.push(edit);
  }
  return byPath;
}

/** Fixes write line feeds; a file with carriage returns keeps to its own. */
function withLineEnds(newText: string, text: string): string {
  return text.includes('\r\n') ? newText.replace(/\r?\n/g, '\r\n') : newText;
}
