/** Where the rows of a stackup lie: heights above the underside of its laminate, mask aside. */
import type { Stackup, StackupRow } from '../../board/model';
import { metres, type Length } from '../../units/quantity';

export interface RowHeights {
  readonly bottom: Length;
  readonly middle: Length;
  readonly top: Length;
}

export function stackupHeights({ rows }: Stackup): ReadonlyMap<StackupRow, RowHeights> {
  const heights = new Map<StackupRow, RowHeights>();
  let bottom = 0;
  for (const row of [...rows].reverse()) {
    if (row.kind === 'mask') continue;
    const top = bottom + row.thickness.value;
    heights.set(row, { bottom: metres(bottom), middle: metres((bottom + top) / 2), top: metres(top) });
    bottom = top;
  }
  return heights;
}
