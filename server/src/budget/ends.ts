/**
 * What each end of a net puts across its line: what is stated, or what is assumed where nothing is
 * (language reference, "net"): 10 ohm behind a driver, 1 Mohm and 5 pF at the far end of one, both 0 ohm
 * and 1 Mohm at the source of a receiver, its own characteristic resistance at a net that is neither.
 */
import type { End } from '../board/model';
import type { Termination } from '../physics/lines/lines';
import { farads, ohms, type Resistance } from '../units/quantity';
import { inText } from '../units/inText';
import type { Role } from './roles';

/** The two assumptions for what feeds a receiver whose source is not stated; the larger result counts. */
export type UnstatedSource = 'none' | 'short' | 'open';

export interface EndCondition {
  /** This net moves now; otherwise it is quiet. */
  readonly moves: boolean;
  readonly unstated: UnstatedSource;
  /** What a net that is neither source nor receiver ends in. */
  readonly characteristic: Resistance;
}

type Ending = Omit<Termination, 'lead'>;

export const assumedDriver = ohms(10);
const assumedLoad: Ending = { resistance: ohms(1e6), capacitance: farads(5e-12) };
const shortCircuit: Ending = { resistance: ohms(0), capacitance: farads(0) };
const openSource: Ending = { resistance: ohms(1e6), capacitance: farads(0) };

export function sourceEnd(role: Role, condition: EndCondition): Ending {
  const { source } = role;
  // A driver behind nothing but a capacitance could not move its line: the assumed resistance drives, with the stated capacitance.
  if (source !== null) return stated(source, role.drives ? assumedDriver : ohms(Infinity));
  if (role.drives && (condition.moves || !role.receives)) return { resistance: assumedDriver, capacitance: farads(0) };
  if (role.receives) return condition.unstated === 'open' ? openSource : shortCircuit;
  return { resistance: condition.characteristic, capacitance: farads(0) };
}

export function loadEnd(role: Role, condition: EndCondition): Ending {
  if (role.load !== null) return stated(role.load, ohms(Infinity));
  if (role.drives || role.receives) return assumedLoad;
  return { resistance: condition.characteristic, capacitance: farads(0) };
}

function stated(end: End, withoutResistance: Resistance): Ending {
  return { resistance: end.resistance?.value ?? withoutResistance, capacitance: end.capacitance?.value ?? farads(0) };
}

/** A receiver of which nobody said what feeds it: there are two results. */
export function hasUnstatedSource(role: Role): boolean {
  return role.receives && role.source === null;
}

export interface Assumption {
  readonly missing: 'source' | 'load';
  readonly assumed: string;
}

/** What had to be assumed for a net that couples, in words. */
export function assumptionsFor(role: Role): readonly Assumption[] {
  const found: Assumption[] = [];
  const driver = inText(assumedDriver, 'resistance');
  if (role.source === null) found.push({ missing: 'source', assumed: assumedSource(role, driver) });
  else if (role.drives && role.source.resistance === null) found.push({ missing: 'source', assumed: `${driver} beside the stated capacitance` });
  if (role.load === null) found.push({ missing: 'load', assumed: role.drives || role.receives ? '1 MΩ and 5 pF' : itsOwn });
  return found;
}

/** The same as clauses, each net named. */
export function assumptionsInWords(roles: readonly Role[]): readonly string[] {
  return roles.flatMap((role) => assumptionsFor(role).map(({ missing, assumed }) => `${role.net.name} states no \`${missing}\`: ${assumed}`));
}

const itsOwn = 'its own characteristic resistance';

function assumedSource(role: Role, driver: string): string {
  if (role.drives && role.receives) return `${driver} while it drives, both 0 Ω and 1 MΩ while it listens; the larger result counts`;
  if (role.drives) return driver;
  return role.receives ? 'both 0 Ω and 1 MΩ; the larger result counts' : itsOwn;
}
