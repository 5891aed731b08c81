import { MarkupKind, type InlayHint, type InlayHintLabelPart } from 'vscode-languageserver';
import type { Hint } from '../service/answers';
import { hints } from '../service/hints';
import { locationOf, spanOf } from './positions';
import type { Server } from './server';

export function answerInlayHints({ connection, guard, documents, settings }: Server): void {
  connection.languages.inlayHint.on(guard('inlay hints', [], async ({ textDocument, range }): Promise<InlayHint[]> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return [];
    const shown = await settings.inlayHints(textDocument.uri);
    const partOf = ({ text, target }: Hint['parts'][number]): InlayHintLabelPart => {
      const location = target === null ? null : locationOf(documents, target);
      return location === null ? { value: text } : { value: text, location };
    };
    return hints(documents.session, file.path, spanOf(file.document, range))
      .filter(({ kind }) => shown[kind])
      .map((hint) => ({
        position: file.document.positionAt(hint.offset),
        label: hint.parts.map(partOf),
        tooltip: { kind: MarkupKind.Markdown, value: hint.tooltip },
        paddingLeft: true,
      }));
  }));
}
