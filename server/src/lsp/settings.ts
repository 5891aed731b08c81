/** The user's settings, asked for when they are needed: an answer is at once today's. */
import type { ClientCapabilities, Connection } from 'vscode-languageserver';
import type { HintKind } from '../service/answers';

export interface Settings {
  readonly inlayHints: (uri: string) => Promise<Readonly<Record<HintKind, boolean>>>;
}

export function createSettings(connection: Connection, capabilities: () => ClientCapabilities): Settings {
  const known = new Map<string, Promise<Readonly<Record<HintKind, boolean>>>>();
  connection.onDidChangeConfiguration(() => {
    known.clear();
    if (capabilities().workspace?.inlayHint?.refreshSupport === true) connection.languages.inlayHint.refresh().catch((error: unknown) => connection.console.warn(`refresh: ${String(error)}`));
  });
  const ask = async (uri: string) => {
    const answer = capabilities().workspace?.configuration === true ? ((await connection.workspace.getConfiguration({ scopeUri: uri, section: 'quietrun.inlayHints' })) as Partial<Record<HintKind, unknown>> | null) : null;
    return { noise: answer?.noise !== false, gap: answer?.gap !== false, length: answer?.length !== false, size: answer?.size !== false };
  };
  return {
    inlayHints(uri) {
      const answer = known.get(uri) ?? ask(uri);
      known.set(uri, answer);
      return answer;
    },
  };
}
