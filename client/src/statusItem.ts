/** The language status item: the worst margin of the file in view, or that the server is not there. */
import * as vscode from 'vscode';
import { State, type BaseLanguageClient } from 'vscode-languageclient';
import type { StatusParams } from '../../server/src/lsp/messages';
import { restartCommand } from './commands';

export interface StatusItem extends vscode.Disposable {
  readonly show: (params: StatusParams) => void;
}

export function createStatusItem(client: BaseLanguageClient): StatusItem {
  const item = vscode.languages.createLanguageStatusItem('quietrun', { language: 'quietrun' });
  item.name = 'Quietrun';
  const known = new Map<string, StatusParams>();
  let state: State = State.Starting;

  const update = () => {
    const uri = vscode.window.activeTextEditor?.document.uri.toString();
    const params = uri === undefined ? undefined : known.get(uri);
    item.busy = state === State.Starting;
    if (state === State.Stopped) {
      item.text = '$(error) Quietrun has stopped';
      item.detail = 'No findings are computed.';
      item.severity = vscode.LanguageStatusSeverity.Error;
      item.command = { command: restartCommand, title: 'Restart' };
      return;
    }
    Object.assign(item, described(params));
    delete (item as { command?: unknown }).command;
  };

  const subscriptions = vscode.Disposable.from(
    item,
    vscode.window.onDidChangeActiveTextEditor(update),
    vscode.workspace.onDidCloseTextDocument((document) => known.delete(document.uri.toString())),
    client.onDidChangeState(({ newState }) => {
      state = newState;
      update();
    }),
  );
  update();
  return {
    show(params) {
      known.set(vscode.Uri.parse(params.uri).toString(), params);
      update();
    },
    dispose: () => subscriptions.dispose(),
  };
}

function described(params: StatusParams | undefined): Pick<vscode.LanguageStatusItem, 'text' | 'detail' | 'severity'> {
  const { Error, Information, Warning } = vscode.LanguageStatusSeverity;
  const incomplete = params !== undefined && 0 < params.incomplete;
  const rest = incomplete ? `${params.incomplete} ${params.incomplete === 1 ? 'budget is' : 'budgets are'} incomplete` : '';
  if (params === undefined || params.worst === null) return { text: 'Quietrun', detail: rest || 'no receiver with a budget', severity: incomplete ? Warning : Information };
  const { receiver, marginDb } = params.worst;
  const margin = `${receiver}: ${marginDb < 0 ? `${(-marginDb).toFixed(1)} dB over` : `${marginDb.toFixed(1)} dB in hand`}`;
  return { text: margin, detail: ['the worst margin', rest].filter(Boolean).join('; '), severity: marginDb < 0 ? Error : incomplete ? Warning : Information };
}
