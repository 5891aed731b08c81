/** What every request of the server is answered with. */
import type { CancellationToken, ClientCapabilities, Connection } from 'vscode-languageserver';
import type { Documents } from './documents';
import type { Settings } from './settings';

export interface Server {
  readonly connection: Connection;
  readonly documents: Documents;
  readonly settings: Settings;
  /** Known once the client has said what it can do. */
  readonly capabilities: () => ClientCapabilities;
  /** See `guard.ts`: `otherwise` is answered where `answer` has a fault. */
  readonly guard: <P, R>(name: string, otherwise: R, answer: (params: P, token: CancellationToken) => Promise<R>) => (params: P, token: CancellationToken) => Promise<R>;
}
