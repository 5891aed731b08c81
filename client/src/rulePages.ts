/** The page of a rule, opened from the link that a finding's rule name is. */
import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';
import { explainMethod, type ExplainParams } from '../../server/src/lsp/messages';

export const rulePagesScheme = 'quietrun-rule';

export function registerRulePages(client: BaseLanguageClient): vscode.Disposable {
  return vscode.workspace.registerTextDocumentContentProvider(rulePagesScheme, {
    async provideTextDocumentContent(uri) {
      const params: ExplainParams = { rule: uri.path.replace(/^\//, '').replace(/\.md$/, '') };
      return (await client.sendRequest<string | null>(explainMethod, params)) ?? `There is no rule ${params.rule}.`;
    },
  });
}
