import type { SelectionRange } from 'vscode-languageserver';
import { selectionRanges } from '../service/selectionRanges';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerSelectionRanges({ connection, guard, documents }: Server): void {
  connection.onSelectionRanges(guard('selection ranges', [], async ({ textDocument, positions }): Promise<SelectionRange[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    return positions.map((position) => {
      const spans = selectionRanges(documents.session, file.path, file.document.offsetAt(position));
      const outermost: SelectionRange = { range: rangeOf(file.document, spans[spans.length - 1]) };
      return spans.slice(0, -1).reduceRight<SelectionRange>((parent, span) => ({ range: rangeOf(file.document, span), parent }), outermost);
    });
  }));
}
