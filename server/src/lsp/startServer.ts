/**
 * The language server on a connection, whatever that runs over: says what it can do, and hands each
 * request to the file that answers it.
 */
import { CodeActionKind, DidChangeConfigurationNotification, DidChangeWatchedFilesNotification, TextDocumentSyncKind, type ClientCapabilities, type Connection, type InitializeParams, type InitializeResult } from 'vscode-languageserver';
import { rules } from '../rules/index';
import { rulePage } from '../rules/rulePage';
import { formatsAfter } from '../service/formatting';
import { Session } from '../service/session';
import { answerCallHierarchy } from './callHierarchy';
import { answerCodeActions } from './codeAction';
import { answerCodeLenses } from './codeLens';
import { answerCompare } from './compare';
import { answerCompletions } from './completion';
import { answerDefinition } from './definition';
import { answerPulls, pushFindings } from './diagnostics';
import { answerHighlights } from './documentHighlight';
import { answerLinks } from './documentLink';
import { Documents } from './documents';
import { answerSymbols } from './documentSymbol';
import { guarded } from './guard';
import { answerFolding } from './folding';
import { answerFormatting } from './formatting';
import { answerHover } from './hover';
import { answerInlayHints } from './inlayHint';
import { explainMethod, type ClientOptions, type ExplainParams } from './messages';
import { clientReader, type FileReader } from './reader';
import { answerReferences } from './references';
import { createRefresher, type Refresher } from './refresh';
import { answerRename } from './rename';
import { answerSelectionRanges } from './selectionRange';
import { answerSemanticTokens, semanticTokensLegend } from './semanticTokens';
import type { Server } from './server';
import { createSettings } from './settings';
import { answerSignatureHelp, signatureTriggers } from './signatureHelp';
import { sendStatus } from './status';
import { tolerancesBehind } from './tolerancesBehind';
import { answerWorkspaceSymbols } from './workspaceSymbol';

/** `ownReader` reads for a client that does not offer to read for the server. */
export function startServer(connection: Connection, ownReader: FileReader): void {
  const session = new Session({ log: (rule, error) => connection.console.error(`${rule}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`) });
  const documents = new Documents(session);
  let capabilities: ClientCapabilities = {};
  let clientOptions: ClientOptions = {};
  const server: Server = {
    connection,
    documents,
    settings: createSettings(connection, () => capabilities),
    capabilities: () => capabilities,
    guard: (name, otherwise, answer) => guarded({ connection, name, answer, otherwise: () => otherwise }),
  };

  const refresher = createRefresher(connection, documents, () => capabilities);
  const tolerances = tolerancesBehind(documents, (error) => connection.console.error(`tolerances: ${String(error)}`), () => refresher.now());

  connection.onInitialize((params) => {
    capabilities = params.capabilities;
    clientOptions = (params.initializationOptions ?? {}) as ClientOptions;
    documents.reader = clientOptions.readsFiles === true ? clientReader(connection) : ownReader;
    documents.paths.setFolders(foldersOf(params));
    const findings = { connection, documents, rulePages: clientOptions.rulePages ?? null, computed: (path: string) => {
      if (clientOptions.showsStatus === true) sendStatus(server, path);
      tolerances.wanted(path);
    } };
    if (pulls(capabilities)) answerPulls(findings, refresher);
    else pushFindings(findings, refresher);
    return abilities(capabilities);
  });

  connection.onInitialized(async () => {
    await register(connection, capabilities);
    if (capabilities.workspace?.workspaceFolders === true) {
      connection.workspace.onDidChangeWorkspaceFolders(async () => {
        documents.paths.setFolders(((await connection.workspace.getWorkspaceFolders()) ?? []).map(({ uri }) => uri));
        await readWorkspace(server, refresher);
      });
    }
    await readWorkspace(server, refresher);
  });

  connection.onShutdown(() => refresher.stop());
  connection.onDidChangeWatchedFiles((params) => documents.changedOnDisk(params));
  connection.onRequest(explainMethod, (params: ExplainParams) => {
    const rule = rules.find(({ name }) => name === params.rule);
    return rule === undefined ? null : rulePage(rule);
  });

  documents.listen(connection);
  answerHover(server, () => clientOptions.showsPictures === true);
  answerInlayHints(server);
  answerCodeActions(server);
  answerCompletions(server);
  answerDefinition(server);
  answerReferences(server);
  answerSymbols(server);
  answerRename(server);
  answerHighlights(server);
  answerWorkspaceSymbols(server);
  answerLinks(server);
  answerCallHierarchy(server);
  answerSignatureHelp(server);
  answerCodeLenses(server, () => clientOptions.showPlaces ?? null);
  answerFolding(server);
  answerFormatting(server);
  answerSelectionRanges(server);
  answerSemanticTokens(server);
  answerCompare(server);
  connection.listen();
}

const pulls = (capabilities: ClientCapabilities) => capabilities.textDocument?.diagnostic !== undefined;

function abilities(capabilities: ClientCapabilities): InitializeResult {
  return {
    capabilities: {
      positionEncoding: 'utf-16',
      textDocumentSync: { openClose: true, change: TextDocumentSyncKind.Incremental },
      ...(pulls(capabilities) ? { diagnosticProvider: { identifier: 'quietrun', interFileDependencies: true, workspaceDiagnostics: true } } : {}),
      hoverProvider: true,
      inlayHintProvider: true,
      completionProvider: { resolveProvider: true },
      signatureHelpProvider: signatureTriggers,
      codeActionProvider: { codeActionKinds: [CodeActionKind.QuickFix] },
      definitionProvider: true,
      referencesProvider: true,
      documentSymbolProvider: true,
      documentHighlightProvider: true,
      workspaceSymbolProvider: true,
      documentLinkProvider: {},
      callHierarchyProvider: true,
      documentFormattingProvider: true,
      documentRangeFormattingProvider: true,
      documentOnTypeFormattingProvider: { firstTriggerCharacter: formatsAfter[0], moreTriggerCharacter: formatsAfter.slice(1) },
      codeLensProvider: {},
      renameProvider: capabilities.textDocument?.rename?.prepareSupport === true ? { prepareProvider: true } : true,
      foldingRangeProvider: true,
      selectionRangeProvider: true,
      semanticTokensProvider: { legend: semanticTokensLegend, full: true, range: true },
      workspace: { workspaceFolders: { supported: true, changeNotifications: true } },
    },
    serverInfo: { name: 'quietrun' },
  };
}

function foldersOf({ workspaceFolders, rootUri }: InitializeParams): readonly string[] {
  if (workspaceFolders !== undefined && workspaceFolders !== null) return workspaceFolders.map(({ uri }) => uri);
  return rootUri === null || rootUri === undefined ? [] : [rootUri];
}

async function register(connection: Connection, { workspace }: ClientCapabilities): Promise<void> {
  if (workspace?.didChangeConfiguration?.dynamicRegistration === true) await connection.client.register(DidChangeConfigurationNotification.type, { section: 'quietrun' });
  if (workspace?.didChangeWatchedFiles?.dynamicRegistration === true) await connection.client.register(DidChangeWatchedFilesNotification.type, { watchers: [{ globPattern: '**/*.quiet' }] });
}

/** A folder that cannot be listed is no reason to answer nothing: files are then read as they are used. */
async function readWorkspace(server: Server, refresher: Refresher): Promise<void> {
  try {
    await server.documents.readWorkspace();
  } catch (error) {
    server.connection.console.warn(`the files of the workspace could not be listed: ${String(error)}`);
  }
  refresher.now();
}
