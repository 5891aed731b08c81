import { MarkupKind, type Hover } from 'vscode-languageserver';
import { hover, hoverWithPictures } from '../service/hover';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerHover({ connection, guard, documents }: Server, showsPictures: () => boolean): void {
  connection.onHover(guard('hover', null, async ({ textDocument, position }): Promise<Hover | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const offset = file.document.offsetAt(position);
    const answer = showsPictures() ? hoverWithPictures(documents.session, file.path, { offset, pictures: { patience } }) : hover(documents.session, file.path, offset);
    if (answer === null) return null;
    return { contents: { kind: MarkupKind.Markdown, value: answer.markdown }, range: rangeOf(file.document, answer.span) };
  }));
}

/** Milliseconds that a hover may work for a picture: with the rest of it, less than anybody waits for. */
const patience = 40;
