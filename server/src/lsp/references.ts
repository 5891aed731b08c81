import type { Location } from 'vscode-languageserver';
import { references } from '../service/references';
import { locationsOf } from './positions';
import type { Server } from './server';

export function answerReferences({ connection, guard, documents }: Server): void {
  connection.onReferences(guard('references', [], async ({ textDocument, position, context }): Promise<Location[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    return locationsOf(documents, references(documents.session, file.path, file.document.offsetAt(position), { includeDeclaration: context.includeDeclaration }));
  }));
}
