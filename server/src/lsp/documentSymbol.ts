import { SymbolKind, type DocumentSymbol } from 'vscode-languageserver';
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { SymbolEntry } from '../service/answers';
import { symbols } from '../service/symbols';
import { rangeOf } from './positions';
import type { Server } from './server';

export const symbolKinds: ReadonlyMap<string, SymbolKind> = new Map<string, SymbolKind>([
  ['board', SymbolKind.Module], ['stackup', SymbolKind.Struct], ['family', SymbolKind.Class], ['net', SymbolKind.Variable], ['pair', SymbolKind.Array],
  ['run', SymbolKind.Object], ['loop', SymbolKind.Event], ['return', SymbolKind.Interface], ['link', SymbolKind.Operator], ['shield', SymbolKind.Package],
  ['ambient', SymbolKind.Constant], ['copper', SymbolKind.Field], ['plane', SymbolKind.Field], ['trace', SymbolKind.Field], ['guard', SymbolKind.Field],
]);

export function answerSymbols({ connection, guard, documents }: Server): void {
  connection.onDocumentSymbol(guard('symbols', [], async ({ textDocument }): Promise<DocumentSymbol[]> => {
    const file = await documents.at(textDocument.uri);
    return file === null ? [] : symbols(documents.session, file.path).map((entry) => symbolOf(entry, file.document));
  }));
}

function symbolOf({ name, kind, detail, span, nameSpan, children }: SymbolEntry, document: TextDocument): DocumentSymbol {
  return {
    name: name === '' ? kind : name, // the protocol refuses a symbol without a name
    kind: symbolKinds.get(kind) ?? SymbolKind.Property,
    detail,
    range: rangeOf(document, span),
    selectionRange: rangeOf(document, nameSpan),
    children: children.map((child) => symbolOf(child, document)),
  };
}
