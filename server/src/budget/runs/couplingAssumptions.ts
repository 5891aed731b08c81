import { kneeFrequency } from '../../physics/lines/knee';
import { inText } from '../../units/inText';
import type { Time } from '../../units/quantity';
import { assumptionsInWords } from '../ends';
import { assumedDrill } from './guardLines';
import { leadsOf, roleOf } from './arrangements';
import type { PartContext } from './coupledRun';
import type { PartReceiver, PartSource } from './partPlayers';
import { neighboursEachSide } from './runParts';
import type { Found } from './worstNoise';

export interface FoundInWords {
  /** What had to be said of guards and returns; null where they carry their balancing current. */
  readonly guards: string | null;
  readonly tied: Found['tied'];
  readonly followed: boolean;
}

/** What a coupling's numbers rest on beyond the text: a clause each. */
export function couplingAssumptions({ run, part, roles, windowed }: PartContext, { source, receiver }: { source: PartSource; receiver: PartReceiver }, { guards: slow, tied, followed }: FoundInWords): readonly string[] {
  const said: string[] = [];
  const traces = [...source.lines, ...receiver.terms].map(({ index }) => part.traces[index]);
  said.push(...assumptionsInWords(traces.map((trace) => roleOf(roles, trace))));
  const guards = new Set(part.conductors.flatMap((conductor) => (conductor.kind === 'guard' ? [conductor.name] : [])));
  const ideal = [...guards].filter((name) => tied?.names.includes(name) !== true);
  if (0 < ideal.length) said.push(`guard ${ideal.join(', ')} counts as tied to the reference everywhere`);
  if (tied !== null) said.push(`guard ${tied.names.join(', ')} is solved as one more line, tied through vias of ${inText(tied.via, 'inductance')} (drill of ${inText(assumedDrill, 'length')}, evenly spread); the parts by either field are those with an ideal guard`);
  if (slow !== null) said.push(slow);
  if (followed) said.push('peaks long after the echoes on the line have died: computed as a lumped circuit from there');
  for (const trace of traces) {
    const { before, after } = leadsOf(trace, roleOf(roles, trace), run.length.value);
    if (0 < before + after) said.push(`${inText(before, 'length')} of ${trace.net.name} before the run and ${inText(after, 'length')} after it count as uncoupled line`);
  }
  const { receiver: { kind, subject, leak } } = receiver;
  if (kind === 'pair' && leak === 0 && 1 < receiver.terms.length) said.push(`${subject.name} states no \`rejects\`: what its two nets have in common counts for nothing`);
  if (windowed) said.push(`with the ${neighboursEachSide} nearest conductors on each side`);
  return said;
}

export function guardsInWords(guards: Found['guards'], rise: Time): Pick<FoundInWords, 'guards'> {
  if (guards === 'ideal') return { guards: null };
  const knee = inText(kneeFrequency(rise), 'frequency');
  return { guards: `the knee at ${knee} is below where guards and returns carry their balancing current: computed ${guards === 'balance' ? 'as if they did' : 'without it'}, which gave the larger noise` };
}
