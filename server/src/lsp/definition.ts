import type { Location } from 'vscode-languageserver';
import { definition } from '../service/definition';
import { locationsOf } from './positions';
import type { Server } from './server';

export function answerDefinition({ connection, guard, documents }: Server): void {
  connection.onDefinition(guard('definition', [], async ({ textDocument, position }): Promise<Location[]> => {
    const file = await documents.at(textDocument.uri);
    return file === null ? [] : locationsOf(documents, definition(documents.session, file.path, file.document.offsetAt(position)));
  }));
}
