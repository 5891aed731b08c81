/** Boards of the workspace, opened and edited through the editor's own interface. */
import * as vscode from 'vscode';
import { eventually } from './assert';

export interface OpenBoard {
  readonly document: vscode.TextDocument;
  readonly editor: vscode.TextEditor;
}

export async function openBoard(path: string): Promise<OpenBoard> {
  const folder = vscode.workspace.workspaceFolders?.[0];
  if (folder === undefined) throw new Error('no workspace folder is open');
  const document = await vscode.workspace.openTextDocument(vscode.Uri.joinPath(folder.uri, path));
  return { document, editor: await vscode.window.showTextDocument(document) };
}

/** A file that was never saved. */
export async function newBoard(content: string): Promise<OpenBoard> {
  const document = await vscode.workspace.openTextDocument({ language: 'quietrun', content });
  return { document, editor: await vscode.window.showTextDocument(document) };
}

/** Replaces the first `from` of the document, as one edit that can be undone. */
export async function replace({ document, editor }: OpenBoard, from: string, to: string): Promise<void> {
  const start = document.getText().indexOf(from);
  if (start < 0) throw new Error(`no ${JSON.stringify(from)} in ${document.uri.path}`);
  const range = new vscode.Range(document.positionAt(start), document.positionAt(start + from.length));
  await editor.edit((edit) => edit.replace(range, to));
}

/** Undoes what was done and closes: the next test finds the file as it is on disk. */
export async function revertAndClose(): Promise<void> {
  await vscode.commands.executeCommand('workbench.action.revertAndCloseActiveEditor');
}

export const ruleOf = (diagnostic: vscode.Diagnostic): string => String(typeof diagnostic.code === 'object' ? diagnostic.code.value : diagnostic.code);

export const findingsOf = (document: vscode.TextDocument, rule?: string): readonly vscode.Diagnostic[] =>
  vscode.languages.getDiagnostics(document.uri).filter((found) => rule === undefined || ruleOf(found) === rule);

/** Waits for findings of a rule, or for there to be none. */
export async function waitForFindings(document: vscode.TextDocument, rule: string, wanted: 'some' | 'none'): Promise<readonly vscode.Diagnostic[]> {
  return eventually(() => {
    const found = findingsOf(document, rule);
    return 0 < found.length === (wanted === 'some') ? found : undefined;
  }, `${wanted} ${rule}`);
}

/** Line and character of the first `text`, after which `<|>`-like points are counted. */
export function positionOf(document: vscode.TextDocument, text: string, offset = 0): vscode.Position {
  const at = document.getText().indexOf(text);
  if (at < 0) throw new Error(`no ${JSON.stringify(text)} in ${document.uri.path}`);
  return document.positionAt(at + offset);
}
