/**
 * How much of a victim's noise is capacitive and how much inductive: the short-line split that people reason with.
 *
 *   driver  R----===================----  load       aggressor: VG across it, IG through it
 *                  Cm         Lm
 *   near   Rn----===================----  Rf  far    victim
 *
 * Model     run short against the edge; each line at one voltage and one current; weak coupling
 * Formula   capacitive  near = far = R Cm dVG/dt (1 - exp(-T / (R Ct))),  R = Rn || Rf
 *           inductive   near = + Zn/(Zn + Zf) Lm dIG/dt (1 - exp(-T (Zn + Zf) / Lt)),  far = - Zf/(Zn + Zf) of the same
 *           dVG/dt = V/T RL/(RS + RL) (1 - exp(-T / (RG CG))),  RG = RS || RL
 *           dIG/dt = V / (T (RS + ZL)) (1 - exp(-T (RS + ZL) / LG))
 * Symbols   Cm, Lm mutuals over the length; Ct, Lt the victim's own with its ends and leads; CG, LG the aggressor's; T 0-100 % of
 *           the edge, V its amplitude; Z an end at the edge's rate
 * Method    an R and C end at the edge's rate: a capacitor that charges through V while the edge lasts draws C V/T on the
 *           average, so it counts as a resistor T/C beside R, 1/Z = 1/R + C/T. That is used where a current divides; where a node
 *           charges, its whole capacitance stands in the exponential instead, which is exact for one node
 * Source    Paul, Introduction to Electromagnetic Compatibility, chapter on crosstalk, from memory; the exponentials: first-order
 *           circuit theory, cases E-cap and E-ind of reference/lumped.json
 * Range     delay below a sixth of the edge. Beyond, a hint at what dominates, no more: the parts of a long line come at different
 *           times and need not add up to its peak
 */
import { volts, type Voltage } from '../../units/quantity';
import type { CoupledLines, Ramp, Termination } from './lines';
import { endCapacitance, leadInductance } from './lumpedCircuit';

export interface CouplingShares {
  /** At the victim's end beside the aggressor's driver. */
  readonly near: Shares;
  readonly far: Shares;
}

/** Signed. */
export interface Shares {
  readonly capacitive: Voltage;
  readonly inductive: Voltage;
}

export function couplingShares(lines: CoupledLines, ramp: Ramp, victim: number): CouplingShares {
  const { order, length } = lines;
  const { duration } = ramp;
  if (duration === 0) return { near: none, far: none };
  const [nearEnds, farEnds] = ramp.end === 'left' ? [lines.left, lines.right] : [lines.right, lines.left];
  const coupling = ramp.line * order + victim;
  const capacitive = charging(nearEnds[victim], farEnds[victim], ownCapacitance(lines, victim), duration) * -lines.capacitance[coupling] * length * voltageSlope(lines, ramp);
  const near = admittanceAtRate(nearEnds[victim], duration);
  const far = admittanceAtRate(farEnds[victim], duration);
  const flux = lines.inductance[victim * (order + 1)] * length + leadInductance(nearEnds[victim]) + leadInductance(farEnds[victim]);
  // Z = 1/admittance throughout: an open end is no special case that way, nor a short one.
  const around = 1 / near + 1 / far;
  const induced = lines.inductance[coupling] * length * currentSlope(lines, ramp) * rising((duration * around) / flux);
  return {
    near: { capacitive: volts(capacitive), inductive: volts(induced * share(far, near)) },
    far: { capacitive: volts(capacitive), inductive: volts(-induced * share(near, far)) },
  };
}

const none: Shares = { capacitive: volts(0), inductive: volts(0) };

/** R (1 - exp(-T / (R C))): volts for an ampere that flows into both ends while the edge lasts; T/C where both are open. */
function charging(one: Termination, other: Termination, capacitance: number, duration: number): number {
  const conductance = 1 / one.resistance + 1 / other.resistance;
  if (conductance === Infinity) return 0;
  const decay = (duration * conductance) / capacitance;
  return decay < 1e-9 ? duration / capacitance : rising(decay) / conductance;
}

function rising(decay: number): number {
  return -Math.expm1(-decay);
}

function ownCapacitance({ order, capacitance, length, left, right }: CoupledLines, line: number): number {
  return capacitance[line * (order + 1)] * length + endCapacitance(left[line]) + endCapacitance(right[line]);
}

function voltageSlope(lines: CoupledLines, { line, end, amplitude, duration }: Ramp): number {
  const [source, load] = end === 'left' ? [lines.left[line], lines.right[line]] : [lines.right[line], lines.left[line]];
  if (source.resistance === Infinity) return 0;
  if (source.resistance === 0) return amplitude / duration;
  // The source as a current V/RS into RS || RL and what the line holds.
  return (amplitude * charging(source, load, ownCapacitance(lines, line), duration)) / (source.resistance * duration);
}

function currentSlope(lines: CoupledLines, { line, end, amplitude, duration }: Ramp): number {
  const [source, load] = end === 'left' ? [lines.left[line], lines.right[line]] : [lines.right[line], lines.left[line]];
  const around = source.resistance + 1 / admittanceAtRate(load, duration);
  // Two shorts leave the line's own inductance to limit the current.
  const flux = lines.inductance[line * (lines.order + 1)] * lines.length + leadInductance(source) + leadInductance(load);
  const decay = (duration * around) / flux;
  return decay < 1e-9 ? amplitude / flux : (amplitude * rising(decay)) / (around * duration);
}

function admittanceAtRate(end: Termination, duration: number): number {
  return 1 / end.resistance + endCapacitance(end) / duration;
}

/** a/(a + b) of two admittances from 0 to Infinity; half where nothing tells them apart. */
function share(a: number, b: number): number {
  if (a === b) return 0.5;
  if (a === Infinity) return 1;
  return a / (a + b);
}
