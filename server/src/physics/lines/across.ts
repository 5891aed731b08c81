/**
 * Lines with something across their ends: whichever way is exact for them.
 *
 * Method    balanced pairs in unknowns in which nothing is across (`balancedPairs.ts`), exact; else by the currents that flow through
 *           what is across (`bridgingCurrents.ts`)
 */
import { seconds, volts } from '../../units/quantity';
import { balancedPairs, type BalancedPairs } from './balancedPairs';
import { bridgedLines } from './bridgingCurrents';
import { combinedWaveform } from './combine';
import type { PreparedLines } from './lineResponse';
import type { CoupledLines, LineResponse, Waveform } from './lines';
import { lineNetwork } from './network';

export function hasAcross({ leftAcross = [], rightAcross = [] }: CoupledLines): boolean {
  return leftAcross.length !== 0 || rightAcross.length !== 0;
}

/** `prepare` solves lines of which nothing is across. */
export function prepareAcross(lines: CoupledLines, prepare: (lines: CoupledLines) => PreparedLines): PreparedLines {
  const balanced = balancedPairs(lines);
  if (balanced === null) return bridgedLines(lines, prepare);
  const prepared = prepare(balanced.lines);
  return {
    lines,
    modes: lineNetwork(lines).modes,
    response: (ramp, window) => inOldLines(lines, balanced, balanced.ramps(ramp).map((one) => prepared.response(one, window))),
  };
}

/** Answers of lumped circuits as well: whatever is linear. */
export function inOldLines(lines: CoupledLines, { parts }: BalancedPairs, answers: readonly LineResponse[]): LineResponse {
  const row = (place: 'left' | 'right' | 'leftTermination' | 'rightTermination') => lines.left.map((_, line): Waveform => combinedWaveform(
    answers.flatMap((answer) => parts(line).map((part) => ({ waveform: answer[place][part.line], factor: part.factor }))),
  ));
  const [left, right] = [row('left'), row('right')];
  const beyond = (side: 'left' | 'right', atEnds: readonly Waveform[]) => {
    if (lines[side].every(({ lead }) => lead === null)) return atEnds;
    return row(`${side}Termination`).map((waveform, line) => (lines[side][line].lead === null ? atEnds[line] : waveform));
  };
  return {
    left, right, leftTermination: beyond('left', left), rightTermination: beyond('right', right),
    window: seconds(Math.min(...answers.map(({ window }) => window))),
    method: answers.find(({ method }) => method !== 'lattice')?.method ?? 'lattice',
    errorBar: lines.left.map((_, line) => volts(answers.reduce((sum, answer) => sum + parts(line).reduce((bar, part) => bar + Math.abs(part.factor) * answer.errorBar[part.line], 0), 0))),
    work: answers.reduce((sum, { work }) => sum + work, 0),
  };
}
