/**
 * Coupled lines as the time-domain models see them: matrices per length, a length, and what each line
 * ends in. Numbers only, SI.
 *
 *   left end                                            right end
 *   e(t) -R-+--[ lead ]--|== coupled, `length` ==|--[ lead ]--+-R- e(t)
 *           C                                                 C
 *   ========================== reference ==========================
 *
 * Each termination is a resistance to a source (0 V where nothing drives it) with a capacitance across
 * the line's end. A lead is uncoupled line between the termination and the coupled length.
 */
import type { Capacitance, Length, Resistance, Time, Voltage } from '../../units/quantity';

export interface CoupledLines {
  readonly order: number;
  /** H/m, row-major, `order` squared. */
  readonly inductance: Float64Array;
  /** F/m, Maxwell form, row-major. */
  readonly capacitance: Float64Array;
  readonly length: Length;
  readonly left: readonly Termination[];
  readonly right: readonly Termination[];
  /** Between two lines' terminations, beyond the leads. Absent where there is nothing. */
  readonly leftAcross?: readonly Across[];
  readonly rightAcross?: readonly Across[];
}

/** A resistance and a capacitance, side by side, between two lines at one end. */
export interface Across {
  readonly first: number;
  readonly second: number;
  /** Above zero; Infinity where there is only a capacitance. */
  readonly resistance: Resistance;
  readonly capacitance: Capacitance;
}

export interface Termination {
  /** Infinity where nothing but a capacitance ends the line; 0 is allowed. */
  readonly resistance: Resistance;
  readonly capacitance: Capacitance;
  readonly lead: { readonly impedance: Resistance; readonly delay: Time } | null;
}

/** One source moves linearly from 0 V to `amplitude` over `duration` (0–100 %) and stays there. */
export interface Ramp {
  readonly line: number;
  readonly end: 'left' | 'right';
  readonly amplitude: Voltage;
  readonly duration: Time;
}

/** A piecewise-linear waveform: `values[i]` at `times[i]`, times rising. */
export interface Waveform {
  readonly times: Float64Array;
  readonly values: Float64Array;
}

export interface LineResponse {
  /** Of line i, at the ends of the coupled length. */
  readonly left: readonly Waveform[];
  readonly right: readonly Waveform[];
  /** Of line i, at its terminations, beyond the leads; the same objects as above where there is no lead. */
  readonly leftTermination: readonly Waveform[];
  readonly rightTermination: readonly Waveform[];
  /** As asked for, or as far as the work allowed reaches. */
  readonly window: Time;
  readonly method: 'lattice' | 'characteristics' | 'lumped';
  /**
   * Of line i: absolute error of any of its values, from two resolutions; rounding only where exact. Each line has
   * its own, since a victim's noise may be a thousandth of what the aggressor moves through.
   */
  readonly errorBar: readonly Voltage[];
  /** Time steps or lattice states computed: the work done. Shared by every answer from one preparation. */
  readonly work: number;
}
