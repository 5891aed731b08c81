/** Offsets of the façade to positions of the protocol and back. Both count UTF-16 code units. */
import type { Location, Range } from 'vscode-languageserver';
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { Place } from '../board/model';
import type { Span } from '../syntax/tree';
import type { Documents } from './documents';

export function rangeOf(document: TextDocument, span: Span): Range {
  return { start: document.positionAt(span.start), end: document.positionAt(span.end) };
}

export function spanOf(document: TextDocument, range: Range): Span {
  return { start: document.offsetAt(range.start), end: document.offsetAt(range.end) };
}

/** Null for a file that is not known: what is built into the language has no place. */
export function locationOf(documents: Documents, { path, span }: Place): Location | null {
  const document = documents.textOf(path);
  return document === null ? null : { uri: documents.paths.uriOf(path), range: rangeOf(document, span) };
}

export function locationsOf(documents: Documents, places: readonly Place[]): Location[] {
  return places.map((place) => locationOf(documents, place)).filter((location): location is Location => location !== null);
}
