import { MarkupKind, type Hover } from 'vscode-languageserver';
import { hover } from '../service/hover';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerHover({ connection, guard, documents }: Server): void {
  connection.onHover(guard('hover', null, async ({ textDocument, position }): Promise<Hover | null> => {
    const file = await documents.at(textDocument.uri);
    const answer = file === null ? null : hover(documents.session, file.path, file.document.offsetAt(position));
    if (file === null || answer === null) return null;
    return { contents: { kind: MarkupKind.Markdown, value: answer.markdown }, range: rangeOf(file.document, answer.span) };
  }));
}
