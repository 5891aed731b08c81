/** The user's settings, asked for when they are needed: an answer is at once today's. */
import { CodeLensRefreshRequest, type ClientCapabilities, type Connection } from 'vscode-languageserver';
import type { HintKind } from '../service/answers';
import type { LensKind } from '../service/lenses';

export interface Settings {
  readonly inlayHints: (uri: string) => Promise<Readonly<Record<HintKind, boolean>>>;
  readonly codeLenses: (uri: string) => Promise<Readonly<Record<LensKind, boolean>>>;
}

export function createSettings(connection: Connection, capabilities: () => ClientCapabilities): Settings {
  const known = new Map<string, Promise<Readonly<Record<string, unknown>>>>();
  connection.onDidChangeConfiguration(() => {
    known.clear();
    const failed = (error: unknown) => connection.console.warn(`refresh: ${String(error)}`);
    const { workspace } = capabilities();
    if (workspace?.inlayHint?.refreshSupport === true) connection.languages.inlayHint.refresh().catch(failed);
    if (workspace?.codeLens?.refreshSupport === true) connection.sendRequest(CodeLensRefreshRequest.type).catch(failed);
  });
  const ask = async (uri: string, section: string): Promise<Readonly<Record<string, unknown>>> => {
    if (capabilities().workspace?.configuration !== true) return {};
    return ((await connection.workspace.getConfiguration({ scopeUri: uri, section })) as Readonly<Record<string, unknown>> | null) ?? {};
  };
  const section = (uri: string, name: string) => {
    const key = `${name} ${uri}`;
    const answer = known.get(key) ?? ask(uri, name);
    known.set(key, answer);
    return answer;
  };
  return {
    async inlayHints(uri) {
      const answer = await section(uri, 'quietrun.inlayHints');
      return { noise: answer['noise'] !== false, gap: answer['gap'] !== false, length: answer['length'] !== false, size: answer['size'] !== false };
    },
    async codeLenses(uri) {
      const answer = await section(uri, 'quietrun.codeLens');
      return { budgets: answer['budgets'] === true, runs: answer['runs'] === true };
    },
  };
}
