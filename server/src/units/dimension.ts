/**
 * The kinds of quantity that the language knows. `spelling.ts` says how the units of each are
 * written; a quantity read under a dimension is in the SI unit named here, `dB` and `number` apart.
 */
export type Dimension =
  | 'length' // m
  | 'area' // m²
  | 'time' // s
  | 'frequency' // Hz
  | 'voltage' // V
  | 'current' // A
  | 'resistance' // ohm
  | 'capacitance' // F
  | 'inductance' // H
  | 'temperature' // K
  | 'level' // dB
  | 'fraction' // 1, written in %
  | 'angle' // rad
  | 'field' // V/m
  | 'voltage-noise' // V/√Hz
  | 'current-noise' // A/√Hz
  | 'number'; // plain: er, loss
