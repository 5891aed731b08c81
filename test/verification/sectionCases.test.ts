/**
 * The reference sections, written as text and read from the JSON of the command line. Expected values: the independent
 * cases of test/reference/sections.json (boundary elements, finite elements, closed forms). Texts are made from the
 * polygons and layers of each case, not from its title: A-GUARD-ms has gaps of 0.3 mm although its title says 0.2.
 */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { boardText, mirroredBoardText, type BoardText } from '../support/boardText';
import { checkedRun, type RunReport } from '../support/checkedText';
import { near } from '../support/near';

type Matrix = readonly (readonly number[])[];
interface Case {
  readonly id: string;
  readonly geometry: {
    readonly ground_planes_y?: readonly number[];
    readonly dielectric_layers?: readonly { readonly er: number; readonly y0: number; readonly y1: number }[];
    readonly conductors?: readonly { readonly name: string; readonly polygon: readonly (readonly [number, number])[] }[];
    readonly reference?: string;
    readonly w?: number; readonly s?: number; readonly b?: number; readonly h?: number; readonly er?: number;
  };
  readonly conductor_order: readonly string[];
  readonly outputs: { readonly C_F_per_m: Matrix; readonly C0_F_per_m: Matrix; readonly L_H_per_m: Matrix };
  readonly derived: { readonly guard_grounded_everywhere?: { readonly C_F_per_m: Matrix; readonly L_H_per_m: Matrix } };
  readonly rel_uncertainty: { readonly C_diag: number; readonly C_mutual: number; readonly L_diag: number; readonly L_mutual: number };
}

const cases: readonly Case[] = JSON.parse(readFileSync('test/reference/sections.json', 'utf8')).cases;
const found = (id: string): Case => cases.find((each) => each.id === id) ?? assert.fail(id);
const mm = (metres: number): string => `${Number((metres * 1e3).toPrecision(9))} mm`;

/** What the language calls a row, from the outlines of the conductors that lie at one height. */
function rowOf(reference: Case, names: readonly string[], word: (name: string) => string): readonly string[] {
  const outlines = names.map((name) => {
    const { polygon } = reference.geometry.conductors!.find((each) => each.name === name)!;
    const xs = polygon.map(([x]) => x);
    return { name, left: Math.min(...xs), right: Math.max(...xs) };
  });
  return outlines.flatMap(({ name, left, right }, at) => [...(at === 0 ? [] : [`gap ${mm(left - outlines[at - 1]!.right)}`]), `${word(name)} ${name} ${mm(right - left)}`]);
}

const one = (row: readonly string[], layer = 'TOP') => new Map([[layer, row]]);
const trace = (): string => 'trace';
const bare = ['copper TOP 35 um', 'prepreg 0.2 mm er 4.2', 'plane GND 18 um'];

const exact = { diagonal: 1e-3, mutual: 1e-3, thin: false };
const zeroThickness = { diagonal: 1.5e-3, mutual: 3e-3, thin: true };

interface Stated {
  readonly id: string;
  readonly board: BoardText;
  readonly expected?: (reference: Case) => { readonly C_F_per_m: Matrix; readonly C0_F_per_m?: Matrix; readonly L_H_per_m: Matrix };
  /** What issue text and design ask of a section of this kind, beyond the case's own uncertainty. */
  readonly asked?: { readonly diagonal: number; readonly mutual: number; readonly thin?: boolean };
}

const stated: readonly Stated[] = [
  ...['A-MS-g0.2', 'A-MS-g0.8'].map((id) => ({ id, board: { rows: bare, on: one(rowOf(found(id), ['A', 'B'], trace)), length: '10 mm' } })),
  {
    id: 'A-MSM-g0.4',
    board: { rows: ['mask 25 um er 3.4', ...bare], on: one(rowOf(found('A-MSM-g0.4'), ['A', 'B'], trace)), length: '10 mm' },
    // A mask that follows the copper: 1e-3 on the diagonal, 2e-2 on mutuals.
    asked: { diagonal: 1e-3, mutual: 2e-2 },
  },
  {
    id: 'A-SLA-g0.30',
    board: { rows: ['plane UP 18 um', 'prepreg 0.5 mm er 4.2', 'copper IN 35 um', 'core 0.2 mm er 4.2', 'plane DOWN 18 um'], on: one(rowOf(found('A-SLA-g0.30'), ['A', 'B'], trace), 'IN'), length: '10 mm' },
  },
  {
    id: 'A-BS-o0.3',
    board: {
      rows: ['plane UP 18 um', 'dielectric 0.2 mm er 4.2', 'copper UPPER 35 um', 'dielectric 0.2 mm er 4.2', 'copper LOWER 35 um', 'dielectric 0.2 mm er 4.2', 'plane DOWN 18 um'],
      // Left edges of A and B are 0.3 mm apart, B lies above.
      on: new Map([['UPPER', ['trace B 0.2 mm']], ['LOWER', ['shift -0.3 mm', 'trace A 0.2 mm']]]),
      length: '10 mm',
    },
  },
  { id: 'A-GUARD-ms', board: { rows: bare, on: one(rowOf(found('A-GUARD-ms'), ['A', 'G', 'V'], trace)), length: '10 mm' } },
  {
    id: 'A-GUARD-ms',
    board: { rows: bare, on: one(rowOf(found('A-GUARD-ms'), ['A', 'G', 'V'], (name) => (name === 'G' ? 'guard' : 'trace')).map((part) => (part.startsWith('guard') ? `${part} stitched 1 mm` : part))), length: '10 mm' },
    expected: (reference) => reference.derived.guard_grounded_everywhere!,
  },
  {
    id: 'A-PCB3-t1.38mil',
    board: { rows: ['copper TOP 0.035052 mm', 'core 1.1938 mm er 4.7'], on: one(rowOf(found('A-PCB3-t1.38mil'), ['L0', 'L1', 'L2'], (name) => (name === 'L0' ? 'return' : 'trace'))), length: '10 mm' },
  },
  // No thickness: the language's thinnest copper, 0.1 um (a two-thousandth of the width), raises C11 by about (t / pi w) ln(w / t) = 1e-3
  // and the mutual, a difference of two such, by twice that.
  {
    id: 'A-EX-cohn-w0.2-s0.2-b0.6',
    board: { rows: ['plane UP 18 um', 'dielectric 0.3 mm er 4.2', 'copper IN 0.1 um', 'dielectric 0.3 mm er 4.2', 'plane DOWN 18 um'], on: one(['trace A 0.2 mm', 'gap 0.2 mm', 'trace B 0.2 mm'], 'IN'), length: '10 mm' },
    asked: zeroThickness,
  },
  { id: 'A-EX-ms-wh1', board: { rows: ['copper TOP 0.1 um', 'dielectric 0.2 mm er 1', 'plane GND 18 um'], on: one(['trace A 0.2 mm']), length: '10 mm' }, asked: zeroThickness },
];

function compare(id: string, run_: RunReport, reference: Case, { expected, asked = exact }: Stated): void {
  const want = expected?.(reference) ?? reference.outputs;
  const order = expected === undefined ? reference.conductor_order : reference.conductor_order.filter((name) => name !== 'G');
  const at = order.map((name) => run_.conductors.indexOf(name));
  assert.ok(at.every((index) => 0 <= index) && run_.conductors.length === order.length, `${id}: ${run_.conductors.join(' ')}`);
  const matrices = [['C', run_.capacitance, want.C_F_per_m, 'C'], ['C0', run_.capacitanceInAir, want.C0_F_per_m, 'C'], ['L', run_.inductance, want.L_H_per_m, 'L']] as const;
  for (const [name, got, wanted, kind] of matrices) {
    if (wanted === undefined) continue;
    assert.ok(got, `${id}: ${name} is null`);
    const largest = Math.max(...wanted.flat().map(Math.abs));
    wanted.forEach((row, i) => row.forEach((value, j) => {
      const own = i === j ? reference.rel_uncertainty[`${kind}_diag`] : reference.rel_uncertainty[`${kind}_mutual`];
      near(got[at[i]!]![at[j]!]!, value, own + (i === j ? asked.diagonal : asked.mutual), `${id} ${name}[${i}][${j}]`);
      // The printed bar is relative, of the largest entry: it must hold the truth as well as the case knows it.
      if (asked.thin !== true) assert.ok(Math.abs(got[at[i]!]![at[j]!]! - value) <= largest * (run_.errorBar! + 2 * own), `${id} ${name}[${i}][${j}]: outside the printed bar ${run_.errorBar}, off by ${Math.abs(got[at[i]!]![at[j]!]! - value) / largest}`);
    }));
  }
}

describe('reference sections through text and JSON', () => {
  for (const each of stated) {
    const kind = each.expected === undefined ? '' : ', guard tied everywhere';
    it(`${each.id}${kind}`, async () => compare(each.id, await checkedRun(boardText(each.board)), found(each.id), each));
    it(`${each.id}${kind}, board the other way up`, async () => {
      const upright = await checkedRun(boardText(each.board));
      const mirrored = await checkedRun(mirroredBoardText(each.board));
      const at = upright.conductors.map((name) => mirrored.conductors.indexOf(name));
      for (const key of ['capacitance', 'capacitanceInAir', 'inductance'] as const) {
        upright[key]!.forEach((row, i) => row.forEach((value, j) => near(mirrored[key]![at[i]!]![at[j]!]!, value, 1e-9, `${key}[${i}][${j}]`)));
      }
    });
  }

  it('impedance and delay of a line alone: sqrt(L/C), sqrt(LC) of the diagonal', async () => {
    // "of each alone, the others at zero potential": C is C11, L is 1 / (c² C0_11), as for a line beside grounded ones.
    const reference = found('A-MS-g0.2');
    const run_ = await checkedRun(boardText(stated[0]!.board));
    const light = 299792458;
    const c = reference.outputs.C_F_per_m[0]![0]!;
    const c0 = reference.outputs.C0_F_per_m[0]![0]!;
    near(run_.impedance![0]!, 1 / (light * Math.sqrt(c * c0)), 1e-3, 'impedance');
    near(run_.delay![0]!, Math.sqrt(c / c0) / light, 1e-3, 'delay');
  });
});
