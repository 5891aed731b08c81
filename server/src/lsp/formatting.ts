import type { TextEdit } from 'vscode-languageserver';
import { formatting, rangeFormatting, typedFormatting } from '../service/formatting';
import type { SpaceEdit } from '../syntax/format/formatEdits';
import type { KnownFile } from './documents';
import { rangeOf, spanOf } from './positions';
import type { Server } from './server';

/** The editor's width of a tab is passed over: the language has one form, which the command line checks. */
export function answerFormatting({ connection, guard, documents }: Server): void {
  const answered = async (uri: string, edits: (file: KnownFile) => readonly SpaceEdit[]): Promise<TextEdit[]> => {
    const file = await documents.at(uri);
    return file === null ? [] : edits(file).map(({ span, newText }) => ({ range: rangeOf(file.document, span), newText }));
  };
  connection.onDocumentFormatting(guard('formatting', [], ({ textDocument }) =>
    answered(textDocument.uri, ({ path }) => formatting(documents.session, path))));
  connection.onDocumentRangeFormatting(guard('range formatting', [], ({ textDocument, range }) =>
    answered(textDocument.uri, ({ path, document }) => rangeFormatting(documents.session, path, spanOf(document, range)))));
  connection.onDocumentOnTypeFormatting(guard('formatting while typing', [], ({ textDocument, position, ch }) =>
    answered(textDocument.uri, ({ path, document }) => typedFormatting(documents.session, path, { offset: document.offsetAt(position), typed: ch }))));
}
