/**
 * Nets as parts of a small circuit: what drives a net, what lies in series on its way, and what listens at its end.
 *
 *   reference --( e )-- R --+-- series -- ... --+-- load      each end a resistance and a capacitance, to references
 *                           C                   R‖C           that are ground unless a shared return lies between
 */
import type { Net } from '../../board/model';
import type { Branch, Circuit, Mutual, Shunt } from '../../physics/circuit/circuit';
import { farads, henries, ohms, type Capacitance, type Inductance, type Resistance } from '../../units/quantity';
import { loadEnd, sourceEnd, type UnstatedSource } from '../ends';
import type { Role, Roles } from '../roles';

export interface SeriesPart {
  readonly resistance: Resistance;
  readonly inductance: Inductance;
}

export interface WiredNet {
  /** Null where nothing but a capacitance stands at its source. */
  readonly sourceBranch: number | null;
  /** In the order of the series parts. */
  readonly series: readonly number[];
  /** Nodes. */
  readonly source: number;
  readonly load: number;
}

export interface NetWiring {
  readonly moves: boolean;
  /** What is assumed where a receiver's source is not stated. */
  readonly unstated: UnstatedSource;
  readonly series?: readonly SeriesPart[];
  readonly sourceReference?: number;
  readonly loadReference?: number;
}

export class Wiring {
  private nodes = 0;
  private readonly shunts: Shunt[] = [];
  private readonly branches: Branch[] = [];
  private readonly mutuals: Mutual[] = [];

  node(): number {
    this.nodes += 1;
    return this.nodes;
  }

  shunt(node: number, to: number, { resistance, capacitance }: { readonly resistance: Resistance; readonly capacitance: Capacitance }): void {
    if (resistance === 0) this.branch(node, to, { resistance, inductance: henries(0) });
    this.shunts.push({ node, to, resistance: resistance === 0 ? ohms(Infinity) : resistance, capacitance });
  }

  branch(from: number, to: number, { resistance, inductance }: SeriesPart): number {
    this.branches.push({ from, to, resistance, inductance });
    return this.branches.length - 1;
  }

  mutual(by: number, into: number, inductance: Inductance): void {
    this.mutuals.push({ by, into, inductance });
  }

  net(role: Role, { moves, unstated, series = [], sourceReference = 0, loadReference = 0 }: NetWiring): WiredNet {
    // A net of a source or a receiver never ends in its characteristic resistance.
    const condition = { moves, unstated, characteristic: ohms(NaN) };
    const [source, load] = [sourceEnd(role, condition), loadEnd(role, condition)];
    const first = this.node();
    let node = first;
    const sourceBranch = source.resistance === Infinity ? null : this.branch(sourceReference, node, { resistance: source.resistance, inductance: henries(0) });
    this.shunt(node, sourceReference, { resistance: ohms(Infinity), capacitance: source.capacitance });
    const wired = series.map((part) => {
      const next = this.node();
      const branch = this.branch(node, next, part);
      node = next;
      return branch;
    });
    this.shunt(node, loadReference, load);
    return { sourceBranch, series: wired, source: first, load: node };
  }

  /** What lies across the loads of pairs of which both nets are wired. */
  pairs(wired: ReadonlyMap<Net, WiredNet>, roles: Roles): void {
    for (const [net, { load }] of wired) {
      const pair = roles.get(net)?.pair ?? null;
      const other = pair === null || pair.plus !== net || pair.minus === null ? undefined : wired.get(pair.minus);
      if (other === undefined || pair?.across == null) continue;
      this.shunt(load, other.load, { resistance: pair.across.resistance?.value ?? ohms(Infinity), capacitance: pair.across.capacitance?.value ?? farads(0) });
    }
  }

  circuit(): Circuit {
    return { nodes: this.nodes, shunts: this.shunts, branches: this.branches, mutuals: this.mutuals };
  }
}
