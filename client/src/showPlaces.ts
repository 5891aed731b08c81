/** What a code lens leads to: the rows of those who disturb a net, in the editor's own list of places. */
import * as vscode from 'vscode';
import type { ShowPlacesArguments } from '../../server/src/lsp/messages';

export const showPlacesCommand = 'quietrun.showPlaces';

export function registerShowPlaces(): vscode.Disposable {
  return vscode.commands.registerCommand(showPlacesCommand, async (...[uri, at, places]: ShowPlacesArguments) => {
    const point = ({ line, character }: ShowPlacesArguments[1]) => new vscode.Position(line, character);
    const locations = places.map(({ uri: of, range }) => new vscode.Location(vscode.Uri.parse(of), new vscode.Range(point(range.start), point(range.end))));
    await vscode.commands.executeCommand('editor.action.showReferences', vscode.Uri.parse(uri), point(at), locations);
  });
}
