import { DocumentHighlightKind, type DocumentHighlight } from 'vscode-languageserver';
import { highlights } from '../service/highlights';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerHighlights({ connection, guard, documents }: Server): void {
  connection.onDocumentHighlight(guard('highlights', [], async ({ textDocument, position }): Promise<DocumentHighlight[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    return highlights(documents.session, file.path, file.document.offsetAt(position)).map(({ span, kind }) => ({ range: rangeOf(file.document, span), kind: kind === 'declaration' ? DocumentHighlightKind.Write : DocumentHighlightKind.Read }));
  }));
}
