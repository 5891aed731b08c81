/**
 * What currents share in a return: resistance and inductance of its pieces in series, and what those numbers rest on.
 */
import type { Project, ReturnPiece, SharedReturn } from '../../board/model';
import { traceResistance } from '../../physics/resistance/traceResistance';
import { barInductance } from '../../physics/returns/barInductance';
import { viaInductance, viaResistance } from '../../physics/returns/viaImpedance';
import { henries, hertz, metres, ohms, type Frequency, type Inductance, type Length, type Resistance } from '../../units/quantity';
import { boardTemperature } from '../boardTemperature';
import { stackupHeights } from '../loops/stackupHeights';
import type { SolveCache } from '../solveCache';
import { stripInductance } from '../stripInductance';
import { onGrid, skinGrid } from '../onGrid';

export interface ReturnImpedance {
  readonly resistance: (frequency: Frequency) => Resistance;
  readonly inductance: Inductance;
  /** Relative, of the whole impedance. */
  readonly errorBar: number;
  readonly assumptions: readonly string[];
}

export function returnImpedance({ pieces, over }: SharedReturn, project: Project, cache: SolveCache): ReturnImpedance {
  const parts = pieces.map((piece) => pieceImpedance(piece, over, project, cache));
  return {
    resistance: (frequency) => ohms(parts.reduce((sum, { resistance }) => sum + resistance(frequency), 0)),
    inductance: henries(parts.reduce((sum, { inductance }) => sum + inductance, 0)),
    errorBar: Math.max(0, ...parts.map(({ errorBar }) => errorBar)),
    assumptions: [...new Set(parts.flatMap(({ assumptions }) => assumptions))],
  };
}

function pieceImpedance(piece: ReturnPiece, over: SharedReturn['over'], project: Project, cache: SolveCache): ReturnImpedance {
  switch (piece.form) {
    case 'strip': return stripImpedance(piece, over, project, cache);
    case 'via': return viaImpedance(piece, project);
    case 'measured': return { resistance: () => piece.resistance.value, inductance: piece.inductance?.value ?? henries(0), errorBar: 0, assumptions: piece.inductance === null ? ['a measured piece without inductance has none'] : [] };
  }
}

function stripImpedance({ length, width, layer, stackup }: Extract<ReturnPiece, { form: 'strip' }>, over: SharedReturn['over'], project: Project, cache: SolveCache): ReturnImpedance {
  const temperature = boardTemperature(project);
  const heights = stackupHeights(stackup);
  const [strip, plane] = [heights.get(layer)!, over === null ? undefined : heights.get(over)];
  const overPlane = plane === undefined ? null : metres(plane.top <= strip.bottom ? strip.bottom - plane.top : plane.bottom - strip.top);
  const perLength = onGrid((frequency) => {
    const key = `resistance ${width.value} ${layer.thickness.value} ${overPlane ?? '-'} ${temperature} ${frequency}`;
    return cache.inductance(key, () => traceResistance({ width: width.value, thickness: layer.thickness.value, overPlane, temperature }, frequency)).perLength;
  }, skinGrid);
  const resistance = (frequency: Frequency) => ohms(length.value * perLength(frequency));
  const section = over === null ? null : stripInductance({ layer, stackup, width: width.value, over: [over] }, cache);
  if (section !== null) return { resistance, inductance: henries(section.inductance * length.value), errorBar: section.errorBar + resistanceError, assumptions: ['the plane under the return has no resistance'] };
  const alone = cache.inductance(`bar ${length.value} ${width.value} ${layer.thickness.value}`, () => ({ value: barInductance(length.value, width.value, layer.thickness.value) })).value;
  return { resistance, inductance: alone, errorBar: resistanceError, assumptions: [partialInductance] };
}

/** Of the skin effect: `traceResistance.ts`. */
const resistanceError = 0.02;
const partialInductance = 'a piece without `over` has its partial inductance, an upper bound: what the signal beside it takes away is not known';

function viaImpedance({ count, drill, length }: Extract<ReturnPiece, { form: 'via' }>, project: Project): ReturnImpedance {
  const vias = { count, drill: drill?.value ?? metres(0), length: length?.value ?? boardThickness(project), temperature: boardTemperature(project) };
  return {
    resistance: (frequency) => viaResistance(vias, frequency),
    inductance: viaInductance(vias),
    errorBar: count === 1 ? singleVia : severalVias,
    assumptions: ['vias are plated with 25 µm', partialInductance, ...(count === 1 ? [] : ['vias side by side count without their mutual inductance, which makes theirs up to twice as large'])],
  };
}

const singleVia = 0.05;
const severalVias = 0.5;

function boardThickness({ stackups: [stackup] }: Project): Length {
  return stackup === undefined ? metres(0) : metres(Math.max(...[...stackupHeights(stackup).values()].map(({ top }) => top)));
}

/** At dc: what a result says of a return without any current. */
export const atRest = hertz(0);
