/**
 * What a changing current induces in a receiver's loop: its waveform for a ramp, its transfer at a frequency.
 *
 *      source end             load end        Model     lumped, linear: e in series with the loop's own L and both ends, R with C across each
 *     +--R||C-- ~e~ --L--+                    Formula   e = -M di/dt (Lenz); at a frequency V_load/I = -j w M Z_load / (Z_source + Z_load + j w L)
 *     |                R||C  v                Signs     the loop's contour leads from its source over the signal's conductor to the load and back;
 *     +------------------+                              v is positive where the load's end is positive against its return
 *                                             Source    Paul, Introduction to Electromagnetic Compatibility; Ott; from memory
 *                                             Range     loops below a tenth of the wave length; weak coupling: no reaction on the current
 *                                             Accuracy  waveform 1e-6 of its peak (`circuitWaveforms.ts`); transfer rounding
 */
import { amperes, henries, ohms, seconds, volts, farads, type Capacitance, type Current, type Frequency, type Inductance, type Resistance, type Time, type Voltage } from '../../units/quantity';
import { circuitWaveforms } from '../circuit/circuitWaveforms';
import type { Phasor } from '../circuit/circuitTransfer';
import type { Waveform } from '../lines/lines';

export interface ReceivingLoop {
  /** With the current that changes; signed. */
  readonly mutual: Inductance;
  /** Of the loop itself; 0 where it is not known. */
  readonly inductance: Inductance;
  readonly source: LoopEnd;
  readonly load: LoopEnd;
}

/** A resistance (Infinity where there is none) and a capacitance across it. */
export interface LoopEnd {
  readonly resistance: Resistance;
  readonly capacitance: Capacitance;
}

export interface CurrentRamp {
  readonly amplitude: Current;
  /** 0-100 % */
  readonly duration: Time;
}

export interface InducedWaveform {
  readonly load: Waveform;
  readonly source: Waveform;
  /** Of the load: the value of largest magnitude, and when. */
  readonly peak: Voltage;
  readonly peakTime: Time;
  readonly errorBar: Voltage;
}

export function inducedWaveform({ mutual, inductance, source, load }: ReceivingLoop, { amplitude, duration }: CurrentRamp, window: Time = seconds(Infinity)): InducedWaveform {
  // The current is a branch of its own that nothing acts back on. Ends that are short circuits are branches' resistances.
  const shorted = (end: LoopEnd): boolean => end.resistance === 0;
  const solved = circuitWaveforms({
    nodes: 3,
    shunts: [[1, source], [2, load]].flatMap(([node, end]) => shorted(end as LoopEnd) ? [] : [{ node: node as number, to: 0, ...(end as LoopEnd) }]),
    branches: [
      { from: shorted(source) ? 0 : 1, to: shorted(load) ? 0 : 2, resistance: ohms(0), inductance },
      { from: 3, to: 0, resistance: ohms(1), inductance: henries(0) },
      ...[[1, source], [2, load]].flatMap(([node, end]) => shorted(end as LoopEnd) ? [{ from: node as number, to: 0, resistance: ohms(1), inductance: henries(0) }] : []),
    ],
    mutuals: [{ by: 1, into: 0, inductance: mutual }],
  }, { drive: { kind: 'current', node: 3 }, amplitude: amperes(amplitude), duration }, window);
  const atLoad = solved.nodes[1];
  let at = 0;
  for (let n = 1; n < atLoad.values.length; n += 1) if (Math.abs(atLoad.values[at]) < Math.abs(atLoad.values[n])) at = n;
  return { load: atLoad, source: solved.nodes[0], peak: volts(atLoad.values[at]), peakTime: seconds(atLoad.times[at]), errorBar: solved.errorBar[1] };
}

/** Volts at the load for one ampere. Null at a resonance without loss, and where neither end lets a current pass nor measures one. */
export function inducedTransfer({ mutual, inductance, source, load }: ReceivingLoop, frequency: Frequency): Phasor | null {
  const angular = 2 * Math.PI * frequency;
  // V/e = 1 / (1 + (Z_source + j w L) Y_load): open ends need no infinite impedance.
  const y = admittance(load, angular);
  if (load.resistance === 0) return { re: 0, im: 0 };
  const ySource = admittance(source, angular);
  const size = ySource.re * ySource.re + ySource.im * ySource.im;
  if (size === 0) return y.re === 0 && y.im === 0 ? null : { re: 0, im: 0 };
  const z: Phasor = source.resistance === 0 ? { re: 0, im: angular * inductance } : { re: ySource.re / size, im: angular * inductance - ySource.im / size };
  const re = 1 + z.re * y.re - z.im * y.im;
  const im = z.re * y.im + z.im * y.re;
  const square = re * re + im * im;
  if (!(0 < square)) return null;
  const e = -angular * mutual;
  return { re: (e * im) / square, im: (e * re) / square };
}

function admittance({ resistance, capacitance }: LoopEnd, angular: number): Phasor {
  return { re: 1 / resistance, im: angular * farads(capacitance) };
}
