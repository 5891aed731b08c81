/**
 * Lines with ties, step by step: the kernel of `tiedLines.ts`, which says model, method and sources.
 *
 *   piece:  launched at its left -> ring of the last steps -> arrives at its right, and back
 */
import { luFactor, luSolve } from '../../numeric/lu';
import type { Ramp } from './lines';
import { endEquation, type LineNetwork } from './network';
import { scatteringOf, type Scattering } from './scattering';
import type { Tie } from './tiedLines';

export interface TiedVoltages {
  /** Of line i, a value for each step. */
  readonly left: readonly Float64Array[];
  readonly right: readonly Float64Array[];
  readonly leftTermination: readonly Float64Array[];
  readonly rightTermination: readonly Float64Array[];
}

interface Steps {
  readonly step: number;
  readonly steps: number;
}

export function marchTied(network: LineNetwork, ties: readonly Tie[], cuts: readonly number[], ramp: Ramp, { step, steps }: Steps): TiedVoltages {
  const { order, modes } = network;
  const pieces = cuts.slice(1).map((cut, k) => new Piece(modes.delays, cut - cuts[k], step));
  const at = (place: number) => ties.filter((tie) => Math.abs(tie.at - place) <= 1e-9).map((tie) => new Via(tie, step));
  const last = cuts.length - 1;
  const ends = [new End(network, 0, at(0), step, steps), new End(network, 1, at(1), step, steps)] as const;
  const joints = cuts.slice(1, last).map((cut) => new Joint(network, at(cut)));
  const drivenSide = ramp.end === 'left' ? 0 : 1;
  for (let n = 0; n <= steps; n += 1) {
    for (const piece of pieces) piece.arrive(n);
    const drive = ramp.amplitude * Math.min(1, (n * step) / ramp.duration);
    ends[0].advance(pieces[0].atLeft, pieces[0].fromLeft, n, drivenSide === 0 ? ramp.line : -1, drive);
    joints.forEach((joint, k) => joint.advance(pieces[k], pieces[k + 1]));
    ends[1].advance(pieces[last - 1].atRight, pieces[last - 1].fromRight, n, drivenSide === 1 ? ramp.line : -1, drive);
    for (const piece of pieces) piece.launch(n);
  }
  const rows = (values: Float64Array) => Array.from({ length: order }, (_, line) => values.subarray(line * (steps + 1), (line + 1) * (steps + 1)));
  return { left: rows(ends[0].voltages), right: rows(ends[1].voltages), leftTermination: rows(ends[0].beyond), rightTermination: rows(ends[1].beyond) };
}

/** A delay of no whole number of steps, in a ring of the latest values. */
class Way {
  private readonly whole: number;
  private readonly weights: readonly [number, number, number, number];
  private readonly ring: Float64Array;

  /** At least two steps. */
  constructor(delay: number) {
    this.whole = Math.floor(delay);
    const f = delay - this.whole;
    this.weights = [(-f * (f - 1) * (f - 2)) / 6, ((f + 1) * (f - 1) * (f - 2)) / 2, (-(f + 1) * f * (f - 2)) / 2, ((f + 1) * f * (f - 1)) / 6];
    this.ring = new Float64Array(this.whole + 3);
  }

  put(n: number, value: number): void {
    this.ring[n % this.ring.length] = value;
  }

  /** What comes out at step n; what went in at step n itself is not needed. */
  out(n: number): number {
    const { ring, weights, whole } = this;
    const from = n + 2 * ring.length - whole;
    return weights[0] * ring[(from + 1) % ring.length] + weights[1] * ring[from % ring.length] + weights[2] * ring[(from - 1) % ring.length] + weights[3] * ring[(from - 2) % ring.length];
  }
}

class Piece {
  readonly atLeft: Float64Array;
  readonly atRight: Float64Array;
  readonly fromLeft: Float64Array;
  readonly fromRight: Float64Array;
  private readonly toRight: readonly Way[];
  private readonly toLeft: readonly Way[];

  constructor(delays: Float64Array, share: number, step: number) {
    const ways = () => Array.from(delays, (delay) => new Way((share * delay) / step));
    [this.toRight, this.toLeft] = [ways(), ways()];
    [this.atLeft, this.atRight, this.fromLeft, this.fromRight] = [0, 0, 0, 0].map(() => new Float64Array(delays.length)) as [Float64Array, Float64Array, Float64Array, Float64Array];
  }

  arrive(n: number): void {
    for (let k = 0; k < this.atLeft.length; k += 1) {
      this.atLeft[k] = this.toLeft[k].out(n);
      this.atRight[k] = this.toRight[k].out(n);
    }
  }

  launch(n: number): void {
    for (let k = 0; k < this.fromLeft.length; k += 1) {
      this.toRight[k].put(n, this.fromLeft[k]);
      this.toLeft[k].put(n, this.fromRight[k]);
    }
  }
}

/** An inductance to the reference: J = conductance v + memory. */
class Via {
  readonly line: number;
  readonly conductance: number;
  memory = 0;
  private current = 0;
  private before = 0;

  constructor({ line, inductance }: Tie, step: number) {
    this.line = line;
    this.conductance = (2 * step) / (3 * inductance);
  }

  settle(voltage: number): void {
    this.before = this.current;
    this.current = this.conductance * voltage + this.memory;
    this.memory = (4 * this.current - this.before) / 3;
  }
}

/** Where two pieces meet and some lines are tied. */
class Joint {
  private readonly impedance: Float64Array;
  private readonly matrix: Float64Array;
  private readonly exchanged: Int32Array;
  private readonly held: Float64Array;
  private readonly slowness: Float64Array;

  constructor(private readonly network: LineNetwork, private readonly vias: readonly Via[]) {
    const count = vias.length;
    this.held = new Float64Array(count);
    this.slowness = Float64Array.from({ length: network.order }, (_, k) => slownessOf(network, k));
    this.impedance = Float64Array.from({ length: count * count }, (_, at) => characteristic(network, vias[Math.floor(at / count)].line, vias[at % count].line));
    this.matrix = this.impedance.map((value, at) => (at % (count + 1) === 0 ? 1 : 0) + (value * vias[at % count].conductance) / 2);
    const exchanged = luFactor(this.matrix, count);
    if (exchanged === null) throw new Error(`ties of ${count} lines have no answer`);
    this.exchanged = exchanged;
  }

  advance(before: Piece, after: Piece): void {
    const { network: { order, modes: { voltage } }, vias, held, impedance } = this;
    const count = vias.length;
    for (let i = 0; i < count; i += 1) {
      let sum = 0;
      for (let k = 0; k < order; k += 1) sum += voltage[vias[i].line * order + k] * (before.atRight[k] + after.atLeft[k]);
      for (let j = 0; j < count; j += 1) sum -= (impedance[i * count + j] * vias[j].memory) / 2;
      held[i] = sum;
    }
    luSolve(this.matrix, this.exchanged, held);
    for (let k = 0; k < order; k += 1) {
      let pulled = 0;
      for (let i = 0; i < count; i += 1) pulled += voltage[vias[i].line * order + k] * (vias[i].conductance * held[i] + vias[i].memory);
      // The waves' sum on both sides, less what the ties take.
      const taken = (this.slowness[k] * pulled) / 2;
      before.fromRight[k] = after.atLeft[k] - taken;
      after.fromLeft[k] = before.atRight[k] - taken;
    }
    for (let i = 0; i < count; i += 1) vias[i].settle(held[i]);
  }
}

/** Modal voltage of a current: Y^-1 = slowness Tv^T, by the modes' normalisation. */
function slownessOf({ modes: { order, voltage, current } }: LineNetwork, k: number): number {
  let sum = 0;
  for (let i = 0; i < order; i += 1) sum += voltage[i * order + k] * current[i * order + k];
  return 1 / sum;
}

/** Entry of the characteristic impedance matrix. */
function characteristic(network: LineNetwork, i: number, j: number): number {
  const { order, modes: { voltage } } = network;
  let sum = 0;
  for (let k = 0; k < order; k += 1) sum += voltage[i * order + k] * slownessOf(network, k) * voltage[j * order + k];
  return sum;
}

interface EndLead {
  readonly impedance: number;
  readonly toLine: Way;
  readonly toTermination: Way;
  readonly bounce: number;
  readonly gain: number;
}

interface EndLine {
  readonly source: number;
  readonly history: number;
  readonly capacitance: number;
  readonly lead: EndLead | null;
  readonly via: Via | null;
  /** The voltage across the capacitor one and two steps before. */
  last: number;
  earlier: number;
}

class End {
  readonly voltages: Float64Array;
  readonly beyond: Float64Array;
  private readonly scattering: Scattering;
  private readonly lines: readonly EndLine[];
  private readonly drives: Float64Array;

  constructor(private readonly network: LineNetwork, side: 0 | 1, vias: readonly Via[], private readonly step: number, private readonly steps: number) {
    const { order, ends, impedance } = network;
    const { resistance, capacitance, leadDelay, leadImpedance } = ends[side];
    const [alpha, beta] = [new Float64Array(order), new Float64Array(order)];
    this.lines = Array.from({ length: order }, (_, line): EndLine => {
      const via = vias.find((one) => one.line === line) ?? null;
      const none = { capacitance: 0, lead: null, last: 0, earlier: 0 };
      if (via !== null) {
        const scale = 1 / (via.conductance + 1 / impedance[line]);
        [alpha[line], beta[line]] = [via.conductance * scale, scale];
        return { ...none, source: 0, history: -scale, via };
      }
      const long = 2 * step <= leadDelay[line];
      const added = long || leadDelay[line] === 0 ? 0 : leadDelay[line] / leadImpedance[line];
      const charge = resistance[line] === 0 ? 0 : capacitance[line] + added;
      const own = endEquation(resistance[line], (1.5 * charge) / step, long ? leadImpedance[line] : impedance[line]);
      const lead = long ? endLead(own, leadImpedance[line], leadDelay[line] / step) : null;
      [alpha[line], beta[line]] = lead === null ? [own.alpha, own.beta] : [1, leadImpedance[line]];
      return { ...none, source: own.source, history: own.history, capacitance: charge, lead, via: null };
    });
    this.scattering = scatteringOf(network.modes, alpha, beta);
    this.drives = new Float64Array(order);
    [this.voltages, this.beyond] = [0, 0].map(() => new Float64Array(order * (steps + 1))) as [Float64Array, Float64Array];
  }

  advance(arriving: Float64Array, leaving: Float64Array, n: number, driven: number, drive: number): void {
    const { network: { order, modes: { voltage } }, scattering: { reflect, admit }, lines, drives, voltages, beyond, steps } = this;
    for (let i = 0; i < order; i += 1) {
      const { lead, via, history } = lines[i];
      drives[i] = via !== null ? history * via.memory : lead !== null ? 2 * lead.toLine.out(n) : this.termination(lines[i], i === driven ? drive : 0);
    }
    for (let k = 0; k < order; k += 1) {
      let sum = 0;
      for (let j = 0; j < order; j += 1) sum += reflect[k * order + j] * arriving[j] + admit[k * order + j] * drives[j];
      leaving[k] = sum;
    }
    for (let i = 0; i < order; i += 1) {
      let across = 0;
      for (let k = 0; k < order; k += 1) across += voltage[i * order + k] * (arriving[k] + leaving[k]);
      voltages[i * (steps + 1) + n] = across;
      const line = lines[i];
      line.via?.settle(across);
      if (line.lead !== null) across = this.through(line, line.lead, across, n, i === driven ? drive : 0);
      beyond[i * (steps + 1) + n] = across;
      [line.earlier, line.last] = [line.last, across];
    }
  }

  /** Right side of the termination's equation: its source and what its capacitor remembers. */
  private termination({ source, history, capacitance, last, earlier }: EndLine, drive: number): number {
    return source * drive + (history * capacitance * (2 * last - earlier / 2)) / this.step;
  }

  /** Both ends of a lead; answers the voltage at the termination. */
  private through(line: EndLine, lead: EndLead, across: number, n: number, drive: number): number {
    const y = lead.toTermination.out(n);
    const x = lead.bounce * y + lead.gain * this.termination(line, drive);
    lead.toTermination.put(n, across - lead.toLine.out(n));
    lead.toLine.put(n, x);
    return x + y;
  }
}

function endLead({ alpha, beta }: { readonly alpha: number; readonly beta: number }, impedance: number, delay: number): EndLead {
  const sum = beta + alpha * impedance;
  return { impedance, toLine: new Way(delay), toTermination: new Way(delay), bounce: (beta - alpha * impedance) / sum, gain: impedance / sum };
}
