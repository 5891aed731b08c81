import { SymbolKind, type SymbolInformation } from 'vscode-languageserver';
import { workspaceSymbols } from '../service/workspaceSymbols';
import { symbolKinds } from './documentSymbol';
import { locationOf } from './positions';
import type { Server } from './server';

export function answerWorkspaceSymbols({ connection, guard, documents }: Server): void {
  connection.onWorkspaceSymbol(guard('workspace symbols', [], async ({ query }): Promise<SymbolInformation[]> => {
    await documents.settle();
    return workspaceSymbols(documents.session, query).flatMap(({ name, kind, path, span, container }) => {
      const location = locationOf(documents, { path, span });
      return location === null ? [] : [{ name, kind: symbolKinds.get(kind) ?? SymbolKind.Property, location, containerName: container }];
    });
  }));
}
