/** A board that is nothing but two nets side by side: what one puts on the other, at any gap and for any length. */
import type { CopperRow, Given, Net, Place, Project, Run, RunConductor, Stackup } from '../board/model';
import { evaluate } from '../budget/evaluate';
import type { Budget, Contribution } from '../budget/results';
import type { SolveCache } from '../budget/solveCache';
import { metres, type Length } from '../units/quantity';

export interface SideBySide {
  readonly stackup: Stackup;
  readonly layer: CopperRow;
  readonly from: Net;
  readonly to: Net;
  readonly widths: readonly [Length, Length];
}

export interface Placed extends SideBySide {
  readonly gap: number;
  readonly length: number;
  /** The receiver's end lies where the source's driver is. */
  readonly reversed: boolean;
}

/** What `from` puts on the receiver of this budget; null where it has no number. */
export function putBeside(project: Project, cache: SolveCache, budget: Budget, placed: Placed): readonly Contribution[] | null {
  const { stackup, layer, from, to, widths, gap, length, reversed } = placed;
  const place: Place = { path: project.root, span: { start: 0, end: 0 } };
  const given = (value: Length): Given<Length> => ({ value, tolerance: 0, place });
  const trace = (net: Net, width: Length, backwards: boolean): RunConductor => ({ kind: 'trace', net, width: given(width), reversed: backwards, after: null, place, whole: place });
  const run: Run = {
    name: `${from.name} beside ${to.name}`, place, whole: place, documentation: null, stackup, without: [], length: given(metres(length)),
    rows: [{ layer, shift: null, conductors: [trace(from, widths[0], false), trace(to, widths[1], reversed)], gaps: [given(metres(gap))] }],
  };
  const { budgets } = evaluate({ ...project, nets: netsFor(project, [from, to]), runs: [run], loops: [], returns: [], links: [], shields: [], ambients: [], gaps: [] }, cache);
  const found = budgets.find(({ subject, kind, measure }) => subject === budget.subject && kind === budget.kind && measure === budget.measure);
  if (found === undefined || found.total === null || !found.complete) return null;
  return found.contributions.filter((each) => each.channel === 'coupled' && each.from === from.name);
}

/** The ends of a net may be those of its pair, which needs its other net. */
function netsFor({ nets, pairs }: Project, wanted: readonly Net[]): Project['nets'] {
  const partners = [...pairs.values()].filter(({ plus, minus }) => wanted.some((net) => net === plus || net === minus)).flatMap(({ plus, minus }) => [plus, minus]);
  return new Map([...nets].filter(([, net]) => wanted.includes(net) || partners.includes(net)));
}
