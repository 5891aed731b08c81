/**
 * A piecewise-linear function, given by its changes of slope, on an even grid of times.
 *
 * Exact at the grid's points wherever the kinks lie. Kinks come in order of time; `rows` holds one number for each
 * kink and column. Adds nothing to what `into` held: it is overwritten from `offset` on, `steps` + 1 values.
 */
export interface KinkColumn {
  readonly count: number;
  readonly times: Float64Array;
  readonly rows: Float64Array;
  /** Numbers in a row, and which of them is meant. */
  readonly order: number;
  readonly column: number;
  /** Added to every time. */
  readonly delay: number;
}

export function sampleKinks({ count, times, rows, order, column, delay }: KinkColumn, step: number, into: Float64Array, offset: number, steps: number): void {
  let value = 0;
  let slope = 0;
  let next = 0;
  for (let n = 0; n <= steps; n += 1) {
    const now = n * step;
    value += slope * step;
    while (next < count && times[next] + delay <= now) {
      const change = rows[next * order + column];
      value += change * (now - times[next] - delay);
      slope += change;
      next += 1;
    }
    into[offset + n] = value;
  }
}
