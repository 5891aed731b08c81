import { CodeActionKind, type CodeAction, type Diagnostic } from 'vscode-languageserver';
import type { Fix } from '../service/answers';
import { fixesAt } from '../service/fixesAt';
import type { Documents } from './documents';
import { spanOf } from './positions';
import type { Server } from './server';
import { workspaceEdit } from './workspaceEdit';

export function answerCodeActions({ connection, guard, documents, capabilities }: Server): void {
  connection.onCodeAction(guard('quick fixes', [], async ({ textDocument, range, context }): Promise<CodeAction[]> => {
    const file = await documents.at(textDocument.uri);
    const wanted = context.only === undefined || context.only.some((kind) => kind === CodeActionKind.QuickFix || kind === '');
    if (file === null || !wanted) return [];
    return fixesAt(documents.session, file.path, spanOf(file.document, range)).map((fix) => ({
      title: fix.title,
      kind: CodeActionKind.QuickFix,
      diagnostics: mended(fix, documents, context.diagnostics),
      isPreferred: fix.preferred,
      edit: workspaceEdit(fix.edits, documents, capabilities()),
    }));
  }));
}

function mended({ rule, at }: Fix, documents: Documents, diagnostics: readonly Diagnostic[]): Diagnostic[] {
  const document = documents.textOf(at.path);
  if (document === null) return [];
  const start = document.offsetAt.bind(document);
  return diagnostics.filter(({ code, range }) => code === rule && start(range.start) <= at.span.end && at.span.start <= start(range.end));
}
