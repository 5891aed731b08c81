import type { PrepareRenameResult, WorkspaceEdit } from 'vscode-languageserver';
import { renameEdits, renameTarget } from '../service/rename';
import { Refusal } from './guard';
import { rangeOf } from './positions';
import type { Server } from './server';
import { workspaceEdit } from './workspaceEdit';

export function answerRename({ connection, guard, documents, capabilities }: Server): void {
  connection.onPrepareRename(guard('prepare rename', null, async ({ textDocument, position }): Promise<PrepareRenameResult | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const target = renameTarget(documents.session, file.path, file.document.offsetAt(position));
    if ('refused' in target) throw new Refusal(target.refused);
    return { range: rangeOf(file.document, target.span), placeholder: target.name };
  }));
  connection.onRenameRequest(guard('rename', null, async ({ textDocument, position, newName }): Promise<WorkspaceEdit | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const answer = renameEdits(documents.session, file.path, file.document.offsetAt(position), newName);
    if ('refused' in answer) throw new Refusal(answer.refused);
    return workspaceEdit(answer.edits, documents, capabilities());
  }));
}
