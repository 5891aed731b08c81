import { SemanticTokensBuilder, type SemanticTokens, type SemanticTokensLegend } from 'vscode-languageserver';
import type { SemanticToken } from '../service/answers';
import { semanticTokens } from '../service/semanticTokens';
import type { Span } from '../syntax/tree';
import { spanOf } from './positions';
import type { Server } from './server';

const types: readonly SemanticToken['type'][] = ['net', 'layer', 'family', 'group', 'part', 'quantity', 'unit'];

/** What the numbers of an answer stand for; `package.json` says from which standard type each takes its colour. */
export const semanticTokensLegend: SemanticTokensLegend = { tokenTypes: [...types], tokenModifiers: ['declaration', 'overBudget'] };

export function answerSemanticTokens(server: Server): void {
  const { connection, guard, documents } = server;
  const none: SemanticTokens = { data: [] };
  connection.languages.semanticTokens.on(guard('semantic tokens', none, async ({ textDocument }) => (await tokens(server, textDocument.uri)) ?? none));
  connection.languages.semanticTokens.onRange(guard('semantic tokens', none, async ({ textDocument, range }) => {
    const file = await documents.at(textDocument.uri);
    return file === null ? none : ((await tokens(server, textDocument.uri, spanOf(file.document, range))) ?? none);
  }));
}

async function tokens({ documents }: Server, uri: string, within: Span = { start: 0, end: Infinity }): Promise<SemanticTokens | null> {
  const file = await documents.at(uri);
  if (file === null) return null;
  const builder = new SemanticTokensBuilder();
  for (const { span, type, declaration, overBudget } of semanticTokens(documents.session, file.path, within)) {
    const { line, character } = file.document.positionAt(span.start);
    builder.push(line, character, span.end - span.start, types.indexOf(type), (declaration ? 1 : 0) | (overBudget ? 2 : 0));
  }
  return builder.build();
}
