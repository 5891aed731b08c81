import { MarkupKind, type CancellationToken, type InlayHint, type InlayHintLabelPart, type InlayHintParams } from 'vscode-languageserver';
import type { Hint } from '../service/answers';
import { hintsOf } from '../service/hints';
import type { KnownFile } from './documents';
import { Superseded } from './guard';
import { locationOf, spanOf } from './positions';
import type { Server } from './server';

export function answerInlayHints(server: Server): void {
  const { connection, guard, documents, settings } = server;
  connection.languages.inlayHint.on(guard('inlay hints', [], async (params, token): Promise<InlayHint[]> => {
    const shown = await settings.inlayHints(params.textDocument.uri);
    const partOf = ({ text, target }: Hint['parts'][number]): InlayHintLabelPart => {
      const location = target === null ? null : locationOf(documents, target);
      return location === null ? { value: text } : { value: text, location };
    };
    const { file, hints } = await collected(server, params, { token, wants: (kind) => shown[kind] });
    return hints.map((hint) => ({
      position: file!.document.positionAt(hint.offset),
      label: hint.parts.map(partOf),
      tooltip: { kind: MarkupKind.Markdown, value: hint.tooltip },
      paddingLeft: true,
    }));
  }));
}

/** Each hint may be a search; what an editor asks for meanwhile, findings above all, is answered between two of them. */
async function collected({ documents }: Server, { textDocument, range }: InlayHintParams, { token, wants }: { token: CancellationToken; wants: (kind: Hint['kind']) => boolean }): Promise<{ file: KnownFile | null; hints: Hint[] }> {
  let changed = false;
  const stop = documents.onChange(() => { changed = true; });
  try {
    let version: number | null | undefined;
    for (;;) {
      const file = await documents.at(textDocument.uri);
      if (file === null) return { file, hints: [] };
      version ??= documents.versionOf(file.path);
      changed = false;
      const hints: Hint[] = [];
      let since = Date.now();
      for (const hint of hintsOf(documents.session, file.path, spanOf(file.document, range), wants)) {
        if (hint !== null) hints.push(hint);
        if (Date.now() - since < atOnce) continue;
        await new Promise((resolve) => setTimeout(resolve, 0));
        if (token.isCancellationRequested || documents.versionOf(file.path) !== version) throw new Superseded();
        // Another file, which this one's board may use: what was searched for already is found again.
        if (changed) break;
        since = Date.now();
      }
      if (!changed) return { file, hints: hints.sort((a, b) => a.offset - b.offset) };
    }
  } finally {
    stop();
  }
}

/** Milliseconds: below what a person notices in an answer that comes between. */
const atOnce = 8;
