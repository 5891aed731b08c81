import type { CodeLens } from 'vscode-languageserver';
import { lenses } from '../service/lenses';
import type { ShowPlacesArguments } from './messages';
import { locationsOf, rangeOf } from './positions';
import type { Server } from './server';

/** `showPlaces`: the client's command that shows them; null where it has none, and the line is only to be read. */
export function answerCodeLenses({ connection, guard, documents, settings }: Server, showPlaces: () => string | null): void {
  connection.onCodeLens(guard('code lenses', [], async ({ textDocument }): Promise<CodeLens[]> => {
    const shown = await settings.codeLenses(textDocument.uri);
    const file = await documents.at(textDocument.uri);
    if (file === null || !Object.values(shown).includes(true)) return [];
    const command = showPlaces();
    return lenses(documents.session, file.path, (kind) => shown[kind]).map(({ place, title, disturbers }) => {
      const range = rangeOf(file.document, place.span);
      const locations = locationsOf(documents, disturbers);
      if (command === null || locations.length === 0) return { range, command: { title, command: '' } };
      return { range, command: { title, command, arguments: [textDocument.uri, range.start, locations] satisfies ShowPlacesArguments } };
    });
  }));
}
