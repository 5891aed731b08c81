/** What one answer of coupled lines costs: an edit re-computes those of the run that changed. */
import { lineResponse, prepareLines } from '../../server/src/physics/lines/lineResponse';
import type { CoupledLines } from '../../server/src/physics/lines/lines';
import { lumpedRun } from '../../server/src/physics/lines/lumpedRun';
import { modesOf } from '../../server/src/physics/lines/modes';
import { peakOf } from '../../server/src/physics/lines/peak';
import { metres, seconds } from '../../server/src/units/quantity';
import { end, lines, ramp, rowOfLines } from '../physics/lines/build';

const delay = 0.6e-9;
const edge = 1e-9;
const window = seconds(edge + 20 * delay);
const drive = ramp(0, 'left', 1, edge);
const lead = (time: number) => ({ impedance: 62, delay: time });

function resistive(order: number): CoupledLines {
  return lines({ ...rowOfLines(order), length: 0.1, left: Array.from({ length: order }, (_, i) => end(10 + 5 * i)), right: Array.from({ length: order }, (_, i) => end(1e3 + 100 * i)) });
}

function loaded(order: number, leadTime = 0): CoupledLines {
  const along = leadTime === 0 ? null : lead(leadTime);
  return lines({ ...rowOfLines(order), length: 0.1, left: Array.from({ length: order }, (_, i) => end(10 + 5 * i, 0, along)), right: Array.from({ length: order }, () => end(1e6, 5e-12, along)) });
}

function answered(given: CoupledLines): number {
  return peakOf(lineResponse(given, drive, window).right[given.order - 1]).value;
}

/** An edge of so many delays, and capacitors of so many delays against the line. */
function lasting(order: number, edges: number, constants: number, leadTime = 0): number {
  const along = leadTime === 0 ? null : lead(leadTime);
  const capacitance = (constants * delay) / 62;
  const given = lines({ ...rowOfLines(order), length: 0.1, left: Array.from({ length: order }, (_, i) => end(10 + 5 * i, 0, along)), right: Array.from({ length: order }, () => end(1e6, capacitance, along)) });
  const duration = edges * delay;
  return peakOf(lineResponse(given, ramp(0, 'left', 1, duration), seconds(duration + 20 * (delay + 2 * leadTime))).right[order - 1]).value;
}

const ratios = [2, 4, 16].flatMap((order) => [0.03, 0.3, 5].flatMap((constants) => [0.01, 3, 50, 200, 1e3, 1e4].map((edges) => ({ name: `${order} lines, RC of ${constants} and an edge of ${edges} delays`, run: () => lasting(order, edges, constants) }))));
const led = [0.01, 3, 50, 200, 1e3, 1e4].map((edges) => ({ name: `two lines with leads of 180 ps, RC of 5 and an edge of ${edges} delays`, run: () => lasting(2, edges, 5, 0.18e-9) }));

const held = prepareLines(loaded(2));
export const cases = [
  { name: 'two lines, resistors: lattice', run: () => answered(resistive(2)) },
  { name: 'three lines, resistors: lattice', run: () => answered(resistive(3)) },
  { name: 'two lines, R and C: characteristics', run: () => answered(loaded(2)) },
  { name: 'the same with leads of 60 ps', run: () => answered(loaded(2, 60e-12)), against: 'two lines, R and C: characteristics' },
  { name: 'the same, prepared: another edge', run: () => peakOf(held.response(ramp(0, 'left', 1, 0.9e-9), seconds(12e-9)).right[1]).value, against: 'two lines, R and C: characteristics' },
  { name: 'eight lines, R and C', run: () => answered(loaded(8)), against: 'two lines, R and C: characteristics' },
  { name: 'sixteen lines, R and C', run: () => answered(loaded(16)), against: 'two lines, R and C: characteristics' },
  { name: 'sixteen lines with leads of 60 ps', run: () => answered(loaded(16, 60e-12)), against: 'sixteen lines, R and C' },
  { name: 'modes of sixteen lines', run: () => modesOf(loaded(16), metres(0.1)).delays[0] },
  { name: 'lumped run of a slow node, two lines', run: () => lumpedRun(lines({ ...rowOfLines(2), length: 0.05, left: [end(1e4), end(Infinity)], right: [end(Infinity, 2e-11), end(1e6, 1e-11)] }), drive, window).work },
  { name: 'lumped run of a slow node, sixteen lines', run: () => lumpedRun(lines({ ...rowOfLines(16), length: 0.05, left: Array.from({ length: 16 }, () => end(1e4)), right: Array.from({ length: 16 }, () => end(1e6, 1e-11)) }), drive, window).work },
  ...ratios,
  ...led,
];
