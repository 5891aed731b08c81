/** What the margins of the board in view have become since its last commit, or against another file: a page beside it. */
import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';
import { compareMethod, largestFile, type CompareAnswer, type CompareParams, type ReadFileAnswer } from '../../server/src/lsp/messages';
import { lastCommit, type Commit } from './committedFiles';
import { listFiles } from './listFiles';
import { readFile, type RealPath } from './readFile';

export const compareCommand = 'quietrun.compareRevisions';
export const comparisonScheme = 'quietrun-comparison';

type Other = { readonly file: vscode.Uri } | { readonly commit: Commit };

export function registerCompareRevisions(client: BaseLanguageClient, realPath: RealPath): vscode.Disposable {
  const pages = new Map<string, string>();
  const changed = new vscode.EventEmitter<vscode.Uri>();
  return vscode.Disposable.from(
    changed,
    vscode.workspace.registerTextDocumentContentProvider(comparisonScheme, {
      onDidChange: changed.event,
      provideTextDocumentContent: (uri) => pages.get(uri.toString()) ?? 'This comparison was not kept. Run *Compare with Another Revision…* again.',
    }),
    // Called by whoever extends the editor, it may be told both files; from a menu, nothing that follows the first is a file.
    vscode.commands.registerCommand(compareCommand, async (of?: unknown, against?: unknown) => {
      const uri = of instanceof vscode.Uri ? of : vscode.window.activeTextEditor?.document.uri;
      if (uri === undefined) return;
      const other = against instanceof vscode.Uri ? { file: against } : await chosen(uri, against === 'commit');
      if (other === null) return;
      const answer = await vscode.window.withProgress({ location: vscode.ProgressLocation.Window, title: 'Comparing noise margins' }, () => compared(client, uri, other, realPath));
      if ('refused' in answer) {
        void vscode.window.showInformationMessage(answer.refused);
        return;
      }
      const page = pageOf(uri, other);
      pages.delete(page.toString());
      pages.set(page.toString(), answer.markdown);
      if (mostPages < pages.size) pages.delete(pages.keys().next().value as string);
      changed.fire(page);
      await vscode.commands.executeCommand('vscode.open', page, { viewColumn: vscode.ViewColumn.Beside, preview: true, preserveFocus: true });
    }),
  );
}

const mostPages = 20;

/** One for each pair that was compared: the same pair again is shown in the same place. */
function pageOf(uri: vscode.Uri, other: Other): vscode.Uri {
  const against = 'file' in other ? other.file.toString() : other.commit.name;
  return vscode.Uri.from({ scheme: comparisonScheme, path: `/Noise margins of ${uri.path.split('/').at(-1)}.md`, query: JSON.stringify([uri.toString(), against]) });
}

interface Offer extends vscode.QuickPickItem {
  readonly other: Other | null;
}

async function chosen(uri: vscode.Uri, committed: boolean): Promise<Other | null> {
  const commit = await lastCommit(uri);
  if (committed && commit !== null) return { commit };
  const boards = (await listFiles()).uris.map((each) => vscode.Uri.parse(each)).filter((each) => each.toString() !== uri.toString());
  const offers: Offer[] = [
    ...(commit === null ? [] : [{ label: '$(git-commit) Last commit', description: [commit.branch, commit.name].filter(Boolean).join(' · '), other: { commit } }]),
    ...boards.map((file) => ({ label: `$(file) ${vscode.workspace.asRelativePath(file)}`, other: { file } })),
    { label: '$(folder-opened) Another file…', other: null },
  ];
  const offer = offers.length === 1 ? offers[0] : await vscode.window.showQuickPick(offers, { title: 'Compare noise margins with', placeHolder: 'The older revision' });
  if (offer === undefined) return null;
  if (offer.other !== null) return offer.other;
  const [file] = (await vscode.window.showOpenDialog({ title: 'Compare noise margins with', openLabel: 'Compare', defaultUri: vscode.Uri.joinPath(uri, '..'), filters: { Quietrun: ['quiet'] } })) ?? [];
  return file === undefined ? null : { file };
}

/** Hands over what the server finds lacking, until it lacks nothing; each file is read once. */
async function compared(client: BaseLanguageClient, uri: vscode.Uri, other: Other, realPath: RealPath): Promise<CompareAnswer & ({ markdown: string } | { refused: string })> {
  const files: { uri: string; answer: ReadFileAnswer }[] = 'file' in other ? [{ uri: other.file.toString(), answer: await chosenText(other.file) }] : [];
  const names = { name: vscode.workspace.asRelativePath(uri), before: 'file' in other ? vscode.workspace.asRelativePath(other.file) : other.commit.name };
  for (let had = -1; had < files.length; ) {
    had = files.length;
    const params: CompareParams = { uri: uri.toString(), name: names.name, before: { root: 'file' in other ? other.file.toString() : null, name: names.before, files } };
    const answer = await client.sendRequest<CompareAnswer>(compareMethod, params);
    if (!('missing' in answer)) return answer;
    files.push(...(await Promise.all(answer.missing.map(async (wanted) => {
      const committed = 'commit' in other ? await other.commit.read(vscode.Uri.parse(wanted.uri)) : null;
      return { uri: wanted.uri, answer: committed ?? (await readFile(wanted, realPath)) };
    }))));
  }
  return { refused: 'The other revision could not be read whole.' };
}

/** A file that a person chose may lie anywhere. */
async function chosenText(uri: vscode.Uri): Promise<ReadFileAnswer> {
  try {
    const { size } = await vscode.workspace.fs.stat(uri);
    return largestFile < size ? { problem: 'too-large' } : { text: new TextDecoder('utf-8').decode(await vscode.workspace.fs.readFile(uri)) };
  } catch {
    return { problem: 'unreadable' };
  }
}
