import { kneeFrequency } from '../../physics/lines/knee';
import { inText } from '../../units/inText';
import type { PartContext } from './coupledRun';
import { assumptionsFor } from '../ends';
import { leadsOf, roleOf } from './excitations';
import { neighboursEachSide } from './runParts';
import type { Found } from './worstNoise';

/** What a coupling's numbers rest on beyond the text: a clause each. */
export function couplingAssumptions({ run, part, roles, windowed }: PartContext, { aggressor, victim }: { aggressor: number; victim: number }, found: Found): readonly string[] {
  const said: string[] = [];
  const traces = [part.traces[aggressor], part.traces[victim]];
  for (const trace of traces) {
    for (const { missing, assumed } of assumptionsFor(roleOf(roles, trace))) said.push(`${trace.net.name} states no \`${missing}\`: ${assumed}`);
  }
  const guards = new Set(part.conductors.flatMap((conductor) => (conductor.kind === 'guard' ? [conductor.name] : [])));
  if (0 < guards.size) said.push(`guard ${[...guards].join(', ')} counts as tied to the reference everywhere`);
  const knee = () => inText(kneeFrequency(found.edge.rise), 'frequency');
  if (found.guards === 'balance') said.push(`the knee at ${knee()} is below where guards and returns carry their balancing current: computed as if they did, which gave the larger noise`);
  if (found.guards === 'idle') said.push(`the knee at ${knee()} is below where guards and returns carry their balancing current: computed without it, which gave the larger noise`);
  if (found.noise.followed) said.push('slower than the echoes on the line: followed to its peak as a lumped circuit');
  for (const trace of traces) {
    const { before, after } = leadsOf(trace, run.length.value);
    if (0 < before + after) said.push(`${inText(before, 'length')} of ${trace.net.name} before the run and ${inText(after, 'length')} after it count as uncoupled line`);
  }
  if (windowed) said.push(`with the ${neighboursEachSide} nearest conductors on each side`);
  return said;
}
