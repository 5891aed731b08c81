/** Writes stackups and runs as the language spells them, right way up or mirrored top to bottom. */

export interface BoardText {
  /** Rows from top to bottom, as `copper TOP 35 um`. */
  readonly rows: readonly string[];
  /** Layer to the conductors and gaps upon it. */
  readonly on: ReadonlyMap<string, readonly string[]>;
  readonly length: string;
  readonly without?: readonly string[];
  /** Declarations of the nets; without them each trace's net is declared and nothing said of it. */
  readonly nets?: string;
}

export function boardText({ rows, on, length, without = [], nets = undriven([...on.values()].flat()) }: BoardText): string {
  const blocks = [...on].map(([layer, row]) => `on ${layer} { ${row.join('; ')} }`);
  return `stackup { ${rows.join('; ')} }\n${nets}\nrun r for ${length} {\n${[...blocks, ...without.map((plane) => `without ${plane}`)].join('\n')}\n}\n`;
}

/**
 * The same board seen from below: the rows the other way round. The runs' layers are named in the order of the
 * rows, so their blocks turn round too, and with them the matrices: `order` of the conductors is the caller's.
 */
export function mirroredBoardText(board: BoardText): string {
  return boardText({ ...board, rows: [...board.rows].reverse() });
}

export const microstripRows: readonly string[] = ['copper TOP 35 um', 'prepreg 0.2 mm er 4.2', 'plane GND 18 um'];

/** A row of equal traces with equal gaps. */
export function traces(names: readonly string[], width: string, gap: string): readonly string[] {
  return names.flatMap((name, at) => (at === 0 ? [`trace ${name} ${width}`] : [`gap ${gap}`, `trace ${name} ${width}`]));
}

function undriven(row: readonly string[]): string {
  return row.filter((part) => part.startsWith('trace ')).map((part) => `net ${part.split(' ')[1]} {}`).join('\n');
}
