/**
 * The client's addresses and the session's keys. A key is the address with nothing encoded,
 * `scheme://authority/path`, so that a `use` joins to it as text; the client's own spelling is kept for
 * the way back, since no two clients encode alike.
 */
import { URI } from 'vscode-uri';

export class Paths {
  readonly #uris = new Map<string, string>();
  #folders: readonly string[] = [];

  /** Workspace folders; with none, what a file may use lies in its own folder or below. */
  setFolders(uris: readonly string[]): void {
    this.#folders = uris.map((uri) => withSlash(keyOfAddress(URI.parse(uri))));
  }

  get folders(): readonly string[] {
    return this.#folders;
  }

  /** Null for what is no file of its own: an old version beside the new one, a view into another. */
  keyOf(uri: string): string | null {
    const address = URI.parse(uri);
    if (address.query !== '') return null;
    const key = address.scheme === 'untitled' ? this.#untitledKey(address) : keyOfAddress(address);
    if (!this.#uris.has(key)) this.#uris.set(key, uri);
    return key;
  }

  /** The client's own spelling of an open document counts from here on. */
  spell(uri: string): void {
    const key = this.keyOf(uri);
    if (key !== null) this.#uris.set(key, uri);
  }

  uriOf(key: string): string {
    const known = this.#uris.get(key);
    if (known !== undefined) return known;
    const [, scheme, authority, path] = /^([^:/]+):\/\/([^/]*)(\/.*)$/s.exec(key) ?? [null, 'file', '', key];
    return URI.from({ scheme: scheme!, authority: authority!, path: path! }).toString();
  }

  /** Folders in which `key` may lie, being used by something: those that contain it by its name. */
  foldersAround(key: string, openFiles: Iterable<string>): readonly string[] {
    if (key.slice(key.indexOf('://') + 3).split('/').some((part) => part === '..' || part === '.' || part.includes('\\') || part.includes('\0'))) return [];
    const around = this.#folders.filter((folder) => key.startsWith(folder));
    if (0 < around.length) return around;
    const own = new Set<string>();
    for (const open of openFiles) {
      if (!this.#folders.some((folder) => open.startsWith(folder))) own.add(folderOf(open));
    }
    return [...own].filter((folder) => key.startsWith(folder));
  }

  /** A file that was never saved lies where it would be saved: its uses are read from there. */
  #untitledKey(address: URI): string {
    const folder = this.#folders[0];
    if (address.path.startsWith('/')) return folder === undefined ? `file://${address.path}` : folder.slice(0, folder.indexOf('/', folder.indexOf('://') + 3)) + address.path;
    return `${folder ?? 'untitled:///'}untitled:${address.path}`;
  }
}

function keyOfAddress({ scheme, authority, path }: URI): string {
  // Editors differ in the case of a drive letter, and file systems do not mind it.
  const plain = scheme === 'file' && /^\/[A-Z]:/.test(path) ? `/${path[1].toLowerCase()}${path.slice(2)}` : path;
  return `${scheme}://${authority}${plain === '' ? '/' : plain}`;
}

export const folderOf = (key: string): string => key.slice(0, key.lastIndexOf('/') + 1);

const withSlash = (key: string) => (key.endsWith('/') ? key : `${key}/`);
