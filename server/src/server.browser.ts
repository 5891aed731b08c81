/** The language server in a Web Worker. */
import { BrowserMessageReader, BrowserMessageWriter, createConnection } from 'vscode-languageserver/browser';
import { noReader } from './lsp/reader';
import { startServer } from './lsp/startServer';

// The worker's own scope, whose type belongs to a library that would be wrong for everything else here.
const scope = globalThis as never;

startServer(createConnection(new BrowserMessageReader(scope), new BrowserMessageWriter(scope)), noReader);
