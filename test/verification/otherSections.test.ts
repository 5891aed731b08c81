/**
 * Sections that no reference case holds, against the tests' own field solver (test/support/fieldEnergy.ts: finite elements, energy,
 * two grids; its own error 0.05–0.5 % of the largest entry). Each is stated twice, as text and as outlines in mm, y up from the
 * lowest plane or face; what the text means is taken from the language reference, which each comment quotes.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { boardText, mirroredBoardText, type BoardText } from '../support/boardText';
import { checkedRun, type RunReport } from '../support/checkedText';
import { fieldCapacitance, fieldCapacitanceInAir, type FieldConductor, type FieldSection } from '../support/fieldEnergy';

const mm = 1e-3;
type Outline = readonly [x0: number, x1: number, y0: number, y1: number, inset?: number];
interface Drawn {
  readonly bottom?: number | null; readonly top?: number | null;
  readonly layers: readonly (readonly [y0: number, y1: number, er: number])[];
  readonly conductors: readonly Outline[];
  readonly grounded?: readonly Outline[];
  readonly patches?: readonly (readonly [x0: number, x1: number, y0: number, y1: number, er: number])[];
}

function drawn({ bottom = 0, top = null, layers, conductors, grounded = [], patches = [] }: Drawn): FieldSection {
  const conductor = ([x0, x1, y0, y1, inset = 0]: Outline): FieldConductor => ({ x0: x0 * mm, x1: x1 * mm, y0: y0 * mm, y1: y1 * mm, inset: inset * mm });
  return {
    bottom: bottom === null ? null : bottom * mm, top: top === null ? null : top * mm,
    layers: layers.map(([y0, y1, er]) => ({ y0: y0 * mm, y1: y1 * mm, er })),
    conductors: [...conductors.map(conductor), ...grounded.map((each) => ({ ...conductor(each), grounded: true }))],
    patches: patches.map(([x0, x1, y0, y1, er]) => ({ x0: x0 * mm, x1: x1 * mm, y0: y0 * mm, y1: y1 * mm, er })),
  };
}

const on = (layer: string, ...row: string[]): ReadonlyMap<string, readonly string[]> => new Map([[layer, row]]);
const board = (rows: string, row: ReadonlyMap<string, readonly string[]>, without: readonly string[] = []): BoardText => ({ rows: rows.split('; '), on: row, length: '10 mm', without });

const sections: readonly { readonly what: string; readonly board: BoardText; readonly field: FieldSection; readonly order?: readonly number[] }[] = [
  { // "per side: the top of a trace is narrower than its foot"; without a core the wide face is on the side that faces the board's middle.
    what: 'undercut microstrip, wide beside narrow',
    board: board('copper TOP 35 um undercut 12 um; prepreg 0.15 mm er 4.2; plane GND 18 um', on('TOP', 'trace A 0.4 mm', 'gap 0.15 mm', 'trace B 0.1 mm')),
    field: drawn({ layers: [[0, 0.15, 4.2]], conductors: [[0, 0.4, 0.15, 0.185, 0.012], [0.55, 0.65, 0.15, 0.185, 0.012]] }),
  },
  { // "beside an outer trace it is the mask (as thick on the laminate, the trace's top and its sides), then air".
    what: 'three traces under a mask that follows them',
    board: board('mask 20 um er 3.5; copper TOP 30 um; prepreg 0.12 mm er 4.1; plane GND 18 um', on('TOP', 'trace A 0.15 mm', 'gap 0.12 mm', 'trace B 0.3 mm', 'gap 0.3 mm', 'trace C 0.15 mm')),
    field: drawn({
      layers: [[0, 0.12, 4.1], [0.12, 0.14, 3.5]], conductors: [[0, 0.15, 0.12, 0.15], [0.27, 0.57, 0.12, 0.15], [0.87, 1.02, 0.12, 0.15]],
      patches: [[-0.02, 0.17, 0.12, 0.17, 3.5], [0.25, 0.59, 0.12, 0.17, 3.5], [0.85, 1.04, 0.12, 0.17, 3.5]],
    }),
  },
  { // "flat: planar, its thickness above the copper's top".
    what: 'flat mask',
    board: board('mask 30 um er 3.6 flat; copper TOP 40 um; prepreg 0.2 mm er 4.3; plane GND 18 um', on('TOP', 'trace A 0.2 mm', 'gap 0.15 mm', 'trace B 0.2 mm')),
    field: drawn({ layers: [[0, 0.2, 4.3], [0.2, 0.27, 3.6]], conductors: [[0, 0.2, 0.2, 0.24], [0.35, 0.55, 0.2, 0.24]] }),
  },
  { // "What fills the space beside an inner trace is the adjacent prepreg, else the row above it".
    what: 'embedded, the fill from the row above',
    board: board('dielectric 0.15 mm er 3.4; copper IN 35 um; dielectric 0.2 mm er 4.6; plane GND 18 um', on('IN', 'trace A 0.2 mm', 'gap 0.2 mm', 'trace B 0.2 mm')),
    field: drawn({ layers: [[0, 0.2, 4.6], [0.2, 0.385, 3.4]], conductors: [[0, 0.2, 0.2, 0.235], [0.4, 0.6, 0.2, 0.235]] }),
  },
  { // "The wide face of a trace lies on the adjacent core", here below; the prepreg above fills.
    what: 'stripline on a core, undercut',
    board: board('plane UP 18 um; prepreg 0.2 mm er 3.6; copper IN 35 um undercut 10 um; core 0.25 mm er 4.7; plane DOWN 18 um', on('IN', 'trace A 0.12 mm', 'gap 0.1 mm', 'trace B 0.25 mm')),
    field: drawn({ top: 0.485, layers: [[0, 0.25, 4.7], [0.25, 0.485, 3.6]], conductors: [[0, 0.12, 0.25, 0.285, 0.01], [0.22, 0.47, 0.25, 0.285, 0.01]] }),
  },
  { // The same with the core above: the wide face is the upper one, the prepreg below fills although it is not "the row above".
    what: 'stripline under a core, undercut, hanging',
    board: board('plane UP 18 um; core 0.25 mm er 4.7; copper IN 35 um undercut 10 um; prepreg 0.2 mm er 3.6; plane DOWN 18 um', on('IN', 'trace A 0.12 mm', 'gap 0.1 mm', 'trace B 0.25 mm')),
    field: drawn({ top: 0.485, layers: [[0, 0.235, 3.6], [0.235, 0.485, 4.7]], conductors: [[0.01, 0.11, 0.2, 0.235, -0.01], [0.23, 0.46, 0.2, 0.235, -0.01]] }),
  },
  { // Two layers on both faces of a core, each in the prepreg beside it; "shift: left edge of this row, from the left edge of the first row".
    what: 'two layers on a core between planes',
    board: board('plane UP 18 um; prepreg 0.2 mm er 3.8; copper U 18 um; core 0.15 mm er 4.6; copper L 35 um; prepreg 0.25 mm er 3.8; plane DOWN 18 um', new Map([['U', ['trace A 0.2 mm']], ['L', ['shift 0.12 mm', 'trace B 0.15 mm']]])),
    field: drawn({ top: 0.653, layers: [[0, 0.285, 3.8], [0.285, 0.435, 4.6], [0.435, 0.653, 3.8]], conductors: [[0, 0.2, 0.435, 0.453], [0.12, 0.27, 0.25, 0.285]] }),
  },
  { // An outer and an inner layer over one plane; "a signal layer that a run does not use is all fill" is the next section.
    what: 'outer over inner layer, one plane',
    board: board('copper TOP 35 um; prepreg 0.12 mm er 4.2; copper IN 18 um; core 0.2 mm er 4.5; plane GND 18 um', new Map([['TOP', ['trace A 0.2 mm']], ['IN', ['shift -0.1 mm', 'trace B 0.15 mm']]])),
    field: drawn({ layers: [[0, 0.2, 4.5], [0.2, 0.338, 4.2]], conductors: [[0, 0.2, 0.338, 0.373], [-0.1, 0.05, 0.2, 0.218]] }),
  },
  {
    what: 'outer layer over an inner one that the run does not use',
    board: board('copper TOP 35 um; prepreg 0.12 mm er 3.2; copper IN 70 um; core 0.2 mm er 5; plane GND 18 um', on('TOP', 'trace A 0.3 mm', 'gap 0.2 mm', 'trace B 0.3 mm')),
    field: drawn({ layers: [[0, 0.2, 5], [0.2, 0.39, 3.2]], conductors: [[0, 0.3, 0.39, 0.425], [0.5, 0.8, 0.39, 0.425]] }),
  },
  { // "return NET 2 mm in a row is a conductor that carries the return current"; no plane: open on both sides.
    what: 'no plane, a return beside the traces',
    board: board('copper TOP 35 um; core 0.8 mm er 4.4', on('TOP', 'return GND 1 mm', 'gap 0.3 mm', 'trace A 0.3 mm', 'gap 0.3 mm', 'trace B 0.5 mm')),
    field: drawn({ bottom: null, layers: [[0, 0.8, 4.4]], conductors: [[1.3, 1.6, 0.8, 0.835], [1.9, 2.4, 0.8, 0.835]], grounded: [[0, 1, 0.8, 0.835]] }),
  },
  { // "guards … reduced out".
    what: 'guard between narrow traces in a stripline',
    board: board('plane UP 18 um; prepreg 0.3 mm er 4.2; copper IN 35 um; core 0.2 mm er 4.2; plane DOWN 18 um', on('IN', 'trace A 0.12 mm', 'gap 0.12 mm', 'guard GND 0.4 mm stitched 1 mm', 'gap 0.12 mm', 'trace B 0.2 mm')),
    field: drawn({ top: 0.535, layers: [[0, 0.535, 4.2]], conductors: [[0, 0.12, 0.2, 0.235], [0.76, 0.96, 0.2, 0.235]], grounded: [[0.24, 0.64, 0.2, 0.235]] }),
  },
  { // "without GND1: that plane is cut away here": the run refers to the next one; its height is prepreg like the fill of any unused layer.
    what: 'a plane cut away',
    board: board('copper TOP 35 um; prepreg 0.15 mm er 4.2; plane GND1 30 um; prepreg 0.2 mm er 4.2; plane GND2 18 um', on('TOP', 'trace A 0.3 mm', 'gap 0.2 mm', 'trace B 0.3 mm'), ['GND1']),
    field: drawn({ layers: [[0, 0.38, 4.2]], conductors: [[0, 0.3, 0.38, 0.415], [0.5, 0.8, 0.38, 0.415]] }),
  },
  { // Heavy copper: the gap is barely wider than the copper is thick.
    what: 'thick copper, narrow gap, thin laminate',
    board: board('copper TOP 70 um; prepreg 0.08 mm er 4; plane GND 18 um', on('TOP', 'trace A 0.6 mm', 'gap 0.1 mm', 'trace B 0.2 mm')),
    field: drawn({ layers: [[0, 0.08, 4]], conductors: [[0, 0.6, 0.08, 0.15], [0.7, 0.9, 0.08, 0.15]] }),
  },
];

function compare(run_: RunReport, field: FieldSection, what: string): void {
  for (const [name, got, wanted] of [['C', run_.capacitance, fieldCapacitance(field)], ['C0', run_.capacitanceInAir, fieldCapacitanceInAir(field)]] as const) {
    assert.ok(got, `${what}: ${name} is null`);
    const largest = Math.max(...wanted.matrix.flat());
    const allowed = wanted.error + 1e-3;
    assert.equal(got.length, wanted.matrix.length);
    wanted.matrix.forEach((row, i) => row.forEach((value, j) => {
      const off = (got[i]![j]! - value) / largest;
      assert.ok(Math.abs(off) <= allowed, `${what} ${name}[${i}][${j}]: ${got[i]![j]} instead of ${value}, off by ${(100 * off).toFixed(3)} % of the largest entry, allowed ${(100 * allowed).toFixed(3)} %`);
    }));
  }
}

describe('sections that no reference holds, against finite elements', () => {
  for (const { what, board: text, field } of sections) {
    it(what, async () => compare(await checkedRun(boardText(text)), field, what));
  }

  it('hang as they stand: the board the other way up gives the same', async () => {
    // Not where the text itself says "above" or "faces the middle": those are the sections whose fill or wide face lacks a core and a prepreg.
    for (const { what, board: text } of sections.filter(({ what: each }) => !each.startsWith('embedded'))) {
      const upright = await checkedRun(boardText(text));
      const mirrored = await checkedRun(mirroredBoardText(text));
      const at = upright.conductors.map((name) => mirrored.conductors.indexOf(name));
      for (const key of ['capacitance', 'capacitanceInAir', 'inductance'] as const) upright[key]!.forEach((row, i) => row.forEach((value, j) => {
        assert.ok(Math.abs(mirrored[key]![at[i]!]![at[j]!]! - value) <= 1e-9 * Math.max(...upright[key]!.flat()), `${what}: ${key}[${i}][${j}]`);
      }));
    }
  });
});
