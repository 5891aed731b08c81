/**
 * The protocol's calls, read as noise: who calls a net is who disturbs it, whom it calls is whom it disturbs. An entry lies where that
 * happens, in the row of a run, so that following it shows the copper.
 */
import { SymbolKind, type CallHierarchyIncomingCall, type CallHierarchyItem, type CallHierarchyOutgoingCall, type Range } from 'vscode-languageserver';
import type { Place } from '../board/model';
import { disturbedBy, disturbs, type Disturbance, type Party } from '../service/disturbances';
import { partiesAt } from '../service/disturbances/partiesAt';
import type { Row } from '../service/disturbances/rows';
import type { Documents } from './documents';
import { locationOf } from './positions';
import type { Server } from './server';

export function answerCallHierarchy({ connection, guard, documents }: Server): void {
  connection.languages.callHierarchy.onPrepare(guard('who disturbs whom', null, async ({ textDocument, position }): Promise<CallHierarchyItem[] | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const parties = partiesAt(documents.session, file.path, file.document.offsetAt(position));
    return parties.length === 0 ? null : parties.flatMap((party) => itemOf(documents, party, { detail: party.detail, row: party.at }));
  }));
  connection.languages.callHierarchy.onIncomingCalls(guard('who disturbs it', null, async ({ item }): Promise<CallHierarchyIncomingCall[] | null> => {
    const party = await partyOf(documents, item);
    return party === null ? null : disturbedBy(documents.session, party).flatMap((each) => incoming(documents, each));
  }));
  connection.languages.callHierarchy.onOutgoingCalls(guard('whom it disturbs', null, async ({ item }): Promise<CallHierarchyOutgoingCall[] | null> => {
    const party = await partyOf(documents, item);
    return party === null ? null : disturbs(documents.session, party).flatMap((each) => outgoing(documents, each, item));
  }));
}

/** One for each file that its rows lie in: their ranges are those of one. */
function incoming(documents: Documents, { party, detail, rows }: Disturbance): readonly CallHierarchyIncomingCall[] {
  const byFile = new Map<string, Row[]>();
  for (const row of rows) byFile.set(row.whole.path, [...(byFile.get(row.whole.path) ?? []), row]);
  return [...byFile.values()].flatMap((of) => itemOf(documents, party, { detail, row: of[0]! }).map((from) => ({ from, fromRanges: rangesIn(documents, of.map(({ whole }) => whole), from.uri) })));
}

/** Ranges are those of the file of the one that disturbs. */
function outgoing(documents: Documents, { party, detail, rows: [row], ownRows }: Disturbance, asked: CallHierarchyItem): readonly CallHierarchyOutgoingCall[] {
  if (row === undefined) return [];
  const ranges = rangesIn(documents, ownRows, asked.uri);
  return itemOf(documents, party, { detail, row }).map((to) => ({ to, fromRanges: 0 < ranges.length ? ranges : [asked.selectionRange] }));
}

const kinds: Record<Party['kind'], SymbolKind> = { net: SymbolKind.Variable, pair: SymbolKind.Array, ambient: SymbolKind.Constant };

function itemOf(documents: Documents, { root, kind, name }: Party, { detail, row }: { readonly detail: string; readonly row: Row }): readonly CallHierarchyItem[] {
  const [whole, own] = [locationOf(documents, row.whole), locationOf(documents, row.name)];
  if (whole === null || own === null) return [];
  return [{ name: name === '' ? kind : name, kind: kinds[kind], detail, uri: whole.uri, range: whole.range, selectionRange: own.range, data: { root, kind, name } satisfies Party }];
}

function rangesIn(documents: Documents, places: readonly Place[], uri: string): Range[] {
  const path = documents.paths.keyOf(uri);
  return places.flatMap((place) => (place.path === path ? (locationOf(documents, place)?.range ?? []) : []));
}

/** Null where the board is no longer there, or the client did not keep what it was given. */
async function partyOf(documents: Documents, { uri, data }: CallHierarchyItem): Promise<Party | null> {
  await documents.known(uri);
  const { root, kind, name } = (typeof data === 'object' && data !== null ? data : {}) as Partial<Record<keyof Party, unknown>>;
  if (typeof root !== 'string' || typeof name !== 'string' || (kind !== 'net' && kind !== 'pair' && kind !== 'ambient')) return null;
  return documents.session.roots().includes(root) ? { root, kind, name } : null;
}
