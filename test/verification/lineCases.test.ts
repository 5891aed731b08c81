/**
 * The reference lines through text and JSON, the section solved on the way. Expected peaks: test/reference/coupled-lines.json
 * (an exact solver and a general-purpose circuit simulator that agree). Their edges are 0–100 %: a stated rise is 0.8 of that.
 * What a peak may be off: 0.5 % and the printed error bar.
 */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { boardText, microstripRows, mirroredBoardText, type BoardText } from '../support/boardText';
import { checkedCoupling, type CouplingReport } from '../support/checkedText';
import { near } from '../support/near';

interface Case {
  readonly id: string;
  readonly inputs: {
    readonly length_m: number; readonly rise_time_0_100_s: number; readonly source_amplitude_V: readonly number[];
    readonly R_near_ohm: readonly number[]; readonly R_far_ohm: readonly number[];
    readonly C_near_F: readonly number[]; readonly C_far_F: readonly number[]; readonly victim_index: number;
  };
  readonly outputs: Record<'near' | 'far', { readonly peak_V: number; readonly t_peak_s: number }>;
}

const cases: readonly Case[] = JSON.parse(readFileSync('test/reference/coupled-lines.json', 'utf8')).cases;
const written = (value: number, unit: string): string => `${Number(value.toPrecision(9))} ${unit}`;

/** Every line of a case is a net; the last is the victim, and a line between has no swing of its own. */
function netsOf({ inputs }: Case, names: readonly string[]): string {
  return names.map((name, at) => {
    const drive = inputs.source_amplitude_V[at] === 0 ? '' : `swing ${inputs.source_amplitude_V[at]} V; rise ${written(inputs.rise_time_0_100_s * 0.8, 's')}; `;
    const end = (ohm: number, farad: number) => `${ohm} ohm${farad === 0 ? '' : `, ${written(farad, 'F')}`}`;
    const tolerance = at === inputs.victim_index ? '; tolerates 1 V peak' : '';
    return `net ${name} { ${drive}source ${end(inputs.R_near_ohm[at]!, inputs.C_near_F[at]!)}; load ${end(inputs.R_far_ohm[at]!, inputs.C_far_F[at]!)}${tolerance} }`;
  }).join('\n');
}

const pair = (gap: string) => ['trace A 0.2 mm', `gap ${gap}`, 'trace V 0.2 mm'];
// The polygons of A-GUARD-ms are 0.3 mm apart.
const between = (what: string) => ['trace A 0.2 mm', 'gap 0.3 mm', what, 'gap 0.3 mm', 'trace V 0.2 mm'];

const stated = new Map<string, { readonly names: readonly string[]; readonly row: readonly string[]; readonly rows?: readonly string[]; readonly tolerance?: number }>([
  ['B-01-short', { names: ['A', 'V'], row: pair('0.2 mm') }],
  ['B-05-cmos', { names: ['A', 'V'], row: pair('0.2 mm') }],
  // Its matrices are those of A-MSM-g0.1: under a mask that follows the copper the mutual is asked for within 2 %, of which the volts get half.
  ['B-07-capload', { names: ['A', 'V'], row: pair('0.1 mm'), rows: ['mask 25 um er 3.4', ...microstripRows], tolerance: 1e-2 }],
  ['B-14-guard-terminated', { names: ['A', 'G', 'V'], row: between('trace G 0.2 mm') }],
  ['B-18-guard-ideal', { names: ['A', 'V'], row: between('guard GND 0.2 mm stitched 1 mm') }],
]);

function board(reference: Case): BoardText {
  const { names, row, rows = microstripRows } = stated.get(reference.id)!;
  return { rows, on: new Map([['TOP', row]]), length: written(reference.inputs.length_m, 'm'), nets: netsOf(reference, names) };
}

describe('reference lines through text and JSON', () => {
  it('is every case that there is', () => assert.deepEqual(cases.map(({ id }) => id).sort(), [...stated.keys()].sort()));

  for (const reference of cases) {
    const { near: wantedNear, far: wantedFar } = reference.outputs;

    it(reference.id, async () => {
      const coupling = await checkedCoupling(boardText(board(reference)));
      const allowed = (stated.get(reference.id)?.tolerance ?? 5e-3) + coupling.errorBar;
      near(coupling.nearEnd, wantedNear.peak_V, allowed, 'near end');
      near(coupling.farEnd, wantedFar.peak_V, allowed, 'far end');
      assert.equal(coupling.atReceiver, coupling.farEnd, 'a receiver is read at its load end');
      assert.ok(coupling.errorBar <= 2e-2, `an error bar of ${coupling.errorBar} says too little`);
    });

    it(`${reference.id}: the peak's time, from where the edge begins`, async () => {
      const coupling = await checkedCoupling(boardText(board(reference)));
      // A crest that is flat moves by more than a permille of the edge; a twentieth of the edge is what a flat top costs.
      near(coupling.peakTime!, wantedFar.t_peak_s, 0.05 * reference.inputs.rise_time_0_100_s / wantedFar.t_peak_s, 'time of the peak');
    });

    it(`${reference.id}: the board the other way up`, async () => {
      const upright = await checkedCoupling(boardText(board(reference)));
      const mirrored = await checkedCoupling(mirroredBoardText(board(reference)));
      for (const key of numbersOf(upright)) near(mirrored[key]!, upright[key]!, 1e-9, key);
    });

    it(`${reference.id}: everything reversed, the same run read from the other side`, async () => {
      const { names, row } = stated.get(reference.id)!;
      const upright = await checkedCoupling(boardText(board(reference)));
      const turned = row.map((part) => (part.startsWith('trace ') ? `${part} reversed` : part)).reverse();
      const seen = await checkedCoupling(boardText({ ...board(reference), on: new Map([['TOP', turned]]), nets: netsOf(reference, names) }));
      for (const key of numbersOf(upright)) near(seen[key]!, upright[key]!, 1e-7, key);
    });

    it(`${reference.id}: a falling edge gives the mirror image`, async () => {
      const text = boardText(board(reference));
      const rise = await checkedCoupling(text);
      const slow = await checkedCoupling(text.replace(/rise ([^;]+);/, 'rise 10 us; fall $1;'), 'A', 'V', 'fall');
      near(slow.farEnd, -rise.farEnd, 1e-9, 'falling edge');
    });
  }
});

function numbersOf(coupling: CouplingReport): readonly ('nearEnd' | 'farEnd' | 'atReceiver' | 'peakTime' | 'widthHalf' | 'capacitivePart' | 'inductivePart')[] {
  assert.ok(coupling.widthHalf !== null);
  return ['nearEnd', 'farEnd', 'atReceiver', 'peakTime', 'widthHalf', 'capacitivePart', 'inductivePart'];
}
