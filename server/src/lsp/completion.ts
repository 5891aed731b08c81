import { CompletionItemKind, InsertTextFormat, MarkupKind, type CompletionItem } from 'vscode-languageserver';
import type { Completion, CompletionKind } from '../service/answers';
import { completions } from '../service/completions';
import { rangeOf } from './positions';
import type { Server } from './server';

const kinds: Record<CompletionKind, CompletionItemKind> = {
  keyword: CompletionItemKind.Keyword,
  declaration: CompletionItemKind.Snippet,
  name: CompletionItemKind.Variable,
  layer: CompletionItemKind.Struct,
  family: CompletionItemKind.Class,
  unit: CompletionItemKind.Unit,
  rule: CompletionItemKind.Event,
  word: CompletionItemKind.EnumMember,
};

/** Documentation is asked for item by item: most of a list is never looked at. */
export function answerCompletions({ connection, guard, documents, capabilities }: Server): void {
  let last: readonly Completion[] = [];
  connection.onCompletion(guard('completion', [], async ({ textDocument, position }): Promise<CompletionItem[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    // A client that knows no snippets would insert their places as they are written.
    const takesSnippets = capabilities().textDocument?.completion?.completionItem?.snippetSupport === true;
    last = completions(documents.session, file.path, file.document.offsetAt(position)).filter(({ snippet }) => takesSnippets || !snippet);
    return last.map(({ label, kind, detail, span, newText, snippet, rank }, index) => ({
      label,
      kind: kinds[kind],
      ...(detail === '' ? {} : { labelDetails: { description: detail } }),
      sortText: String(rank).padStart(6, '0') + label,
      insertTextFormat: snippet ? InsertTextFormat.Snippet : InsertTextFormat.PlainText,
      textEdit: { range: rangeOf(file.document, span), newText },
      data: index,
    }));
  }));
  connection.onCompletionResolve((item) => {
    const documentation = last[item.data as number]?.documentation ?? '';
    return documentation === '' ? item : { ...item, documentation: { kind: MarkupKind.Markdown, value: documentation } };
  });
}
