/**
 * The files that the server knows: those that the client has open, kept in step with every edit, and
 * those that boards use, read when an analysis asks for them and again when they change on the disk.
 *
 * The session is handed text by key and knows of no client; this is the one place that knows both.
 */
import { TextDocuments, type Connection, type DidChangeWatchedFilesParams, type TextDocumentChangeEvent } from 'vscode-languageserver';
import { TextDocument } from 'vscode-languageserver-textdocument';
import type { Session } from '../service/session';
import { Superseded } from './guard';
import { Paths } from './paths';
import { noReader, type FileReader } from './reader';

/** A document as a request finds it. */
export interface KnownFile {
  readonly path: string;
  readonly document: TextDocument;
}

export class Documents {
  readonly paths = new Paths();
  readonly session: Session;
  /** Set once it is known what the client can do. */
  reader: FileReader = noReader;
  readonly #open = new TextDocuments(TextDocument);
  /** Files that no one has open, for their positions; the session has their text. */
  readonly #read = new Map<string, TextDocument>();
  readonly #reading = new Map<string, Promise<void>>();
  /** Reads that answers wait for: of a file whose text is known to be old. */
  readonly #due = new Set<Promise<void>>();
  readonly #listeners = new Set<(path: string) => void>();
  readonly #rereadListeners: (() => void)[] = [];
  readonly #editListeners: ((path: string) => void)[] = [];

  constructor(session: Session) {
    this.session = session;
  }

  listen(connection: Connection): void {
    this.#open.onDidOpen(({ document }) => this.paths.spell(document.uri));
    this.#open.onDidChangeContent((event) => this.#edited(event));
    this.#open.onDidClose((event) => this.#closed(event));
    this.#open.listen(connection);
  }

  /** Is told of each file of which the text is another than before, until what it returns is called. */
  onChange(listener: (path: string) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  /** Is told when a file was read anew for a reason that the client may not connect with what it shows. */
  onReread(listener: () => void): void {
    this.#rereadListeners.push(listener);
  }

  /** Is told of each edit of an open file. */
  onEdit(listener: (path: string) => void): void {
    this.#editListeners.push(listener);
  }

  /** Every file of the workspace that may be a board, so that it is known who uses whom. */
  async readWorkspace(): Promise<void> {
    const uris = await this.reader.list(this.paths.folders.map((folder) => this.paths.uriOf(folder)));
    const paths = uris.map((uri) => this.paths.keyOf(uri)).filter((path): path is string => path !== null);
    await Promise.all(paths.filter((path) => !this.#isOpen(path)).map((path) => this.#readFile(path)));
  }

  /**
   * The file that a request is about, when all that its projects use has been read. Null for one that is
   * not open, which is not ours to answer for.
   */
  async at(uri: string): Promise<KnownFile | null> {
    const path = this.paths.keyOf(uri);
    if (path === null || this.#open.get(uri) === undefined) return null;
    return this.known(uri);
  }

  /** The same for any file that is known, open or not. */
  async known(uri: string): Promise<KnownFile | null> {
    const path = this.paths.keyOf(uri);
    if (path === null) return null;
    const version = this.#open.get(uri)?.version;
    // Edits that have already arrived go first.
    await new Promise((resolve) => setTimeout(resolve, 0));
    await this.settle();
    if (this.#open.get(uri)?.version !== version) throw new Superseded();
    const document = this.textOf(path);
    return document === null ? null : { path, document };
  }

  /** Reads until no project lacks a file that could still be read. */
  async settle(): Promise<void> {
    await Promise.all(this.#due);
    for (let missing = this.session.missing(); 0 < missing.length; missing = this.session.missing()) {
      await Promise.all(missing.map((path) => this.#readFile(path)));
    }
  }

  /** For positions in any file that the session knows. */
  textOf(path: string): TextDocument | null {
    return this.#open.get(this.paths.uriOf(path)) ?? this.#read.get(path) ?? null;
  }

  /** The version that an edit is made for; null for a file that is not open. */
  versionOf(path: string): number | null {
    return this.#open.get(this.paths.uriOf(path))?.version ?? null;
  }

  openPaths(): readonly string[] {
    return this.#open.keys().map((uri) => this.paths.keyOf(uri)).filter((path): path is string => path !== null);
  }

  /** Files that changed on the disk; what is open is the editor's own and newer. */
  async changedOnDisk({ changes }: DidChangeWatchedFilesParams): Promise<void> {
    const paths = changes.map(({ uri }) => this.paths.keyOf(uri)).filter((path): path is string => path !== null);
    await Promise.all(paths.filter((path) => !this.#isOpen(path)).map((path) => this.#readDue(path)));
  }

  #edited({ document }: TextDocumentChangeEvent<TextDocument>): void {
    const path = this.paths.keyOf(document.uri);
    if (path === null) return;
    this.#read.delete(path);
    this.session.setText(path, document.getText());
    this.#changed(path);
    for (const listener of this.#editListeners) listener(path);
  }

  #closed({ document }: TextDocumentChangeEvent<TextDocument>): void {
    const path = this.paths.keyOf(document.uri);
    if (path === null) return;
    // What was not saved is gone with the editor: the file on the disk counts again, if there is one.
    this.session.forget(path);
    void this.#readDue(path);
  }

  #readDue(path: string): Promise<void> {
    // What is being read already may have been read before the change.
    const reading = (this.#reading.get(path) ?? Promise.resolve()).then(() => this.#readFile(path)).finally(() => this.#due.delete(reading));
    this.#due.add(reading);
    void reading.then(() => {
      if (this.#due.size === 0) for (const listener of this.#rereadListeners) listener();
    });
    return reading;
  }

  async #readFile(path: string): Promise<void> {
    const reading = this.#reading.get(path) ?? this.#readNow(path).finally(() => this.#reading.delete(path));
    this.#reading.set(path, reading);
    return reading;
  }

  async #readNow(path: string): Promise<void> {
    const inside = this.paths.foldersAround(path, this.openPaths());
    const answer = inside.length === 0 ? { problem: 'outside' as const } : await this.reader.read(this.paths.uriOf(path), inside.map((folder) => this.paths.uriOf(folder))).catch(() => ({ problem: 'unreadable' as const }));
    if (this.#isOpen(path)) return; // it was opened meanwhile, and that text counts
    if ('text' in answer) {
      this.#read.set(path, TextDocument.create(this.paths.uriOf(path), 'quietrun', 0, answer.text));
      this.session.setText(path, answer.text);
    } else {
      this.#read.delete(path);
      this.session.setProblem(path, { problem: answer.problem, ...('spelling' in answer ? { actual: answer.spelling } : {}) });
    }
    this.#changed(path);
  }

  #isOpen(path: string): boolean {
    return this.#open.get(this.paths.uriOf(path)) !== undefined;
  }

  #changed(path: string): void {
    for (const listener of [...this.#listeners]) listener(path);
  }
}
