import { CodeActionKind, TextDocumentEdit, type CodeAction, type Diagnostic } from 'vscode-languageserver';
import type { Edit, Fix } from '../service/answers';
import { fixesAt } from '../service/fixesAt';
import type { Documents } from './documents';
import { rangeOf, spanOf } from './positions';
import type { Server } from './server';

export function answerCodeActions({ connection, guard, documents }: Server): void {
  connection.onCodeAction(guard('quick fixes', [], async ({ textDocument, range, context }): Promise<CodeAction[]> => {
    const file = await documents.at(textDocument.uri);
    const wanted = context.only === undefined || context.only.some((kind) => kind === CodeActionKind.QuickFix || kind === '');
    if (file === null || !wanted) return [];
    return fixesAt(documents.session, file.path, spanOf(file.document, range)).map((fix) => ({
      title: fix.title,
      kind: CodeActionKind.QuickFix,
      diagnostics: mended(fix, documents, context.diagnostics),
      isPreferred: fix.preferred,
      edit: { documentChanges: documentEdits(fix.edits, documents) },
    }));
  }));
}

function mended({ rule, at }: Fix, documents: Documents, diagnostics: readonly Diagnostic[]): Diagnostic[] {
  const document = documents.textOf(at.path);
  if (document === null) return [];
  const start = document.offsetAt.bind(document);
  return diagnostics.filter(({ code, range }) => code === rule && start(range.start) <= at.span.end && at.span.start <= start(range.end));
}

/** For the versions that the edits were computed from: an editor that has moved on refuses them. */
function documentEdits(edits: readonly Edit[], documents: Documents): TextDocumentEdit[] {
  const byPath = new Map<string, Edit[]>();
  for (const edit of edits) byPath.set(edit.path, [...(byPath.get(edit.path) ?? []), edit]);
  return [...byPath].flatMap(([path, of]) => {
    const document = documents.textOf(path);
    if (document === null) throw new Error(`an edit in ${path}, which is not known`);
    const textDocument = { uri: documents.paths.uriOf(path), version: documents.versionOf(path) };
    return [TextDocumentEdit.create(textDocument, of.map(({ span, newText }) => ({ range: rangeOf(document, span), newText: withLineEnds(newText, document.getText()) })))];
  });
}

/** Fixes write line feeds; a file with carriage returns keeps to its own. */
function withLineEnds(newText: string, text: string): string {
  return text.includes('\r\n') ? newText.replace(/\r?\n/g, '\r\n') : newText;
}
