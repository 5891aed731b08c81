/** Layers where a run, a loop or a return names them. */
import type { NameValue, Span, Statement } from '../syntax/tree';
import type { CopperRow, PlaneRow } from './model';
import { referTo, shown, wantedCopper, wantedPlane } from './references';
import { gap, type Scope } from './resolution';
import type { Layers, ResolvedStackup } from './stackups';

export interface Located<Row> {
  readonly row: Row;
  readonly in: ResolvedStackup;
  /** Where it is named. */
  readonly span: Span;
}

export function copperNamed(scope: Scope, value: NameValue, layers: Layers): Located<CopperRow> | null {
  const name = referTo(scope, value, wantedCopper)?.[0];
  return name === undefined ? null : (rowCalled(scope, value, layers, { name, kind: 'copper' }) as Located<CopperRow> | null);
}

export function planeNamed(scope: Scope, value: NameValue, layers: Layers): Located<PlaneRow> | null {
  const name = referTo(scope, value, wantedPlane)?.[0];
  return name === undefined ? null : planeCalled(scope, value, layers, name);
}

/** Of a name that has been looked up already. */
export function planeCalled(scope: Scope, value: NameValue, layers: Layers, name: string): Located<PlaneRow> | null {
  return rowCalled(scope, value, layers, { name, kind: 'plane' }) as Located<PlaneRow> | null;
}

/** The words before a block. */
export function headOf({ span, block }: Statement): Span {
  return { start: span.start, end: block?.span.start ?? span.end };
}

function rowCalled(scope: Scope, value: NameValue, { byName }: Layers, { name, kind }: { readonly name: string; readonly kind: 'copper' | 'plane' }): Located<CopperRow | PlaneRow> | null {
  const found = byName.get(name);
  if (found !== undefined && found.row.kind === kind) return { ...found, span: value.span };
  // Declared, but its row could not be read, which is a finding of its own.
  gap(scope, value.span, `layer ${shown(name)}`);
  return null;
}
