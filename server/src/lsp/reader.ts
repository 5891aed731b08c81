/**
 * Where the server gets the files that no one has open. Two ways: by asking the client, which can read
 * whatever its editor can, or from the disk, for a client that knows nothing of such questions.
 */
import type { Connection } from 'vscode-languageserver';
import { listFilesMethod, readFileMethod, type ListFilesAnswer, type ReadFileAnswer, type ReadFileParams } from './messages';

export interface FileReader {
  /** `inside`: addresses of folders, in one of which the file really has to lie. */
  readonly read: (uri: string, inside: readonly string[]) => Promise<ReadFileAnswer>;
  /** Addresses of the board files below these folders. */
  readonly list: (folders: readonly string[]) => Promise<readonly string[]>;
}

export function clientReader(connection: Connection): FileReader {
  return {
    async read(uri, inside) {
      const params: ReadFileParams = { uri, inside };
      return connection.sendRequest<ReadFileAnswer>(readFileMethod, params);
    },
    async list() {
      return (await connection.sendRequest<ListFilesAnswer>(listFilesMethod)).uris;
    },
  };
}

/** For a server that can read nothing itself, as in a worker whose client does not offer to. */
export const noReader: FileReader = {
  read: async () => ({ problem: 'missing' }),
  list: async () => [],
};
