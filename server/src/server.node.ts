/** The language server as a process of the editor, over the channel that the editor chose. */
import { createConnection } from 'vscode-languageserver/node';
import { diskReader } from './lsp/diskReader';
import { startServer } from './lsp/startServer';

startServer(createConnection(), diskReader);
