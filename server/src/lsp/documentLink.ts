import type { DocumentLink } from 'vscode-languageserver';
import { links } from '../service/links';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerLinks({ connection, guard, documents }: Server): void {
  connection.onDocumentLinks(guard('links', [], async ({ textDocument }): Promise<DocumentLink[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    // A file from elsewhere may be open, and known; what a board uses lies inside its folder.
    const isInside = (target: string) => 0 < documents.paths.foldersAround(target, [file.path]).length;
    return links(documents.session, file.path).filter(({ target }) => isInside(target)).map(({ span, target, tooltip }) => ({ range: rangeOf(file.document, span), target: documents.paths.uriOf(target), tooltip }));
  }));
}
