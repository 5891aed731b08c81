import { FoldingRangeKind, type FoldingRange } from 'vscode-languageserver';
import type { Fold } from '../service/answers';
import { folds } from '../service/folding';
import type { Server } from './server';

const kinds: Record<Fold['kind'], { readonly kind?: FoldingRangeKind }> = { block: {}, comment: { kind: FoldingRangeKind.Comment }, imports: { kind: FoldingRangeKind.Imports } };

export function answerFolding({ connection, guard, documents }: Server): void {
  connection.onFoldingRanges(guard('folding', [], async ({ textDocument }): Promise<FoldingRange[]> => {
    const file = await documents.at(textDocument.uri);
    return file === null ? [] : folds(documents.session, file.path).map(({ startLine, endLine, kind }) => ({ startLine, endLine, ...kinds[kind] }));
  }));
}
