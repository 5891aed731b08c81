/**
 * Coupled lines made ready for waves: their modes, and every termination as one linear equation between the voltage
 * across a line's end and the current that enters the line there.
 *
 *        R     v          alpha v + beta i = source e + history h
 *   e --/\/\---+--> i
 *              |          G = 2 C/dt is the trapezoidal companion of the capacitor, h its memory: i_C = G v - h.
 *             === C       G = Infinity is the limit of the fastest changes: the capacitor as a short circuit
 *              |
 *   ===========+====
 *
 * Source    companion models: Branin 1967; Dommel 1969; from memory
 * Range     R from 0 to Infinity, C from 0 up. alpha has no unit, beta is in ohm; both stay near one and near the line's
 *           impedance, so that systems made of such rows are well conditioned
 */
import { metres } from '../../units/quantity';
import type { CoupledLines, Termination } from './lines';
import { modesOf, type Modes } from './modes';

export interface LineNetwork {
  readonly order: number;
  readonly modes: Modes;
  /** What each line's end looks like from its termination, the other lines' ends shorted, ohm. */
  readonly impedance: Float64Array;
  /** Left, right. */
  readonly ends: readonly [LineEnds, LineEnds];
}

/** One end of all lines. */
export interface LineEnds {
  readonly resistance: Float64Array;
  readonly capacitance: Float64Array;
  /** What the termination looks into: its lead, else the coupled line, ohm. */
  readonly seen: Float64Array;
  readonly leadImpedance: Float64Array;
  /** 0 where there is no lead. */
  readonly leadDelay: Float64Array;
}

export interface EndEquation {
  readonly alpha: number;
  readonly beta: number;
  readonly source: number;
  readonly history: number;
}

export function lineNetwork(lines: CoupledLines): LineNetwork {
  checkNumbers(lines);
  // Lines of no length have no modes; a nanometre couples nothing that could be seen and keeps every formula whole.
  const length = metres(Math.max(lines.length, shortestLength));
  const modes = modesOf(lines, length);
  const impedance = Float64Array.from({ length: lines.order }, (_, i) => 1 / ownAdmittance(modes, length, i));
  const negligible = negligibleLead * modes.delays[0];
  return { order: lines.order, modes, impedance, ends: [lineEnds(lines.left, impedance, negligible), lineEnds(lines.right, impedance, negligible)] };
}

/** The end's equation for a companion conductance `conductance`; `impedance` is what it looks into and sets the scale. */
export function endEquation(resistance: number, conductance: number, impedance: number): EndEquation {
  if (resistance === 0) return { alpha: 1, beta: 0, source: 1, history: 0 };
  if (conductance === Infinity) return { alpha: 1, beta: 0, source: 0, history: 0 };
  // Divided by R, so that R = Infinity is no special case.
  const own = 1 / resistance;
  const scale = 1 / (own + conductance + 1 / impedance);
  return { alpha: (own + conductance) * scale, beta: scale, source: own * scale, history: scale };
}

const shortestLength = 1e-9;
/** Of the fastest mode's delay: a lead that short holds a hundred-thousandth of the line's charge and flux. */
const negligibleLead = 1e-5;
/** A resistance this large passes nothing that a double could tell from zero. */
const openResistance = 1e15;

/** Entry (i, i) of the characteristic admittance Y Tv^-1 = Y z Y^T, z the modal slownesses. */
function ownAdmittance({ order, current, delays }: Modes, length: number, i: number): number {
  let sum = 0;
  for (let k = 0; k < order; k += 1) sum += (current[i * order + k] ** 2 * delays[k]) / length;
  return sum;
}

function lineEnds(terminations: readonly Termination[], impedance: Float64Array, negligible: number): LineEnds {
  const leads = terminations.map(({ lead }) => (lead !== null && negligible < lead.delay ? lead : null));
  return {
    resistance: Float64Array.from(terminations, ({ resistance }) => (openResistance < resistance ? Infinity : resistance)),
    capacitance: Float64Array.from(terminations, ({ capacitance }) => capacitance),
    seen: Float64Array.from(leads, (lead, line) => lead?.impedance ?? impedance[line]),
    leadImpedance: Float64Array.from(leads, (lead) => lead?.impedance ?? 0),
    leadDelay: Float64Array.from(leads, (lead) => lead?.delay ?? 0),
  };
}

/** Numbers that cannot be are a mistake of the caller's, not of the board's. */
function checkNumbers({ order, inductance, capacitance, length, left, right }: CoupledLines): void {
  if (!(1 <= order) || inductance.length !== order * order || capacitance.length !== order * order) {
    throw new Error(`${order} lines with ${inductance.length} inductances and ${capacitance.length} capacitances`);
  }
  if (left.length !== order || right.length !== order) throw new Error(`${order} lines with ${left.length} left and ${right.length} right terminations`);
  if (!(0 <= length) || length === Infinity) throw new Error(`lines of length ${length}`);
  for (const { resistance, capacitance: shunt, lead } of [...left, ...right]) {
    if (!(0 <= resistance) || !(0 <= shunt)) throw new Error(`termination of ${resistance} ohm and ${shunt} F`);
    if (lead !== null && (!(0 < lead.impedance) || lead.impedance === Infinity || !(0 <= lead.delay) || lead.delay === Infinity)) {
      throw new Error(`lead of ${lead.impedance} ohm and ${lead.delay} s`);
    }
  }
}
