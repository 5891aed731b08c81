/**
 * A receiver's own noise as it counts in its budget: thermal noise of what stands at its ends, noise of what it listens through, contact
 * noise of its resistors. As a peak each is a multiple of its rms; what needs a band and has none leaves the budget incomplete.
 */
import type { Project } from '../board/model';
import { boardTemperature } from './boardTemperature';
import type { Counted } from './contributions';
import { ownCircuits } from './own/ownCircuits';
import { ownContact } from './own/ownContact';
import { ownContribution } from './own/ownContribution';
import { ownInput } from './own/ownInput';
import { ownThermal } from './own/ownThermal';
import { bandOf, type Receiver } from './receivers';
import type { Roles } from './roles';
import type { SolveCache } from './solveCache';

export interface OwnNoiseOf {
  readonly project: Project;
  readonly roles: Roles;
  readonly cache: SolveCache;
}

export function ownNoise({ project, roles, cache }: OwnNoiseOf, receiver: Receiver, measure: 'peak' | 'rms'): Counted {
  const band = bandOf(receiver);
  const circuits = ownCircuits(receiver, roles);
  const input = ownInput(receiver, circuits, { band, cache });
  const contact = ownContact(receiver, circuits, band);
  const noises = [...ownThermal(circuits, { temperature: boardTemperature(project), band }, cache), ...input.noises, ...contact.noises];
  const finite = noises.filter(({ noise: { rms, errorBar } }) => rms < Infinity && errorBar < Infinity);
  // Numbers beyond what doubles hold are no numbers, and never silently nothing.
  const beyond = noises.filter((noise) => !finite.includes(noise)).map(({ channel }) => ({ what: `its own ${channel} noise is not counted: it has no finite value`, place: receiver.subject.place }));
  const lacking = [...(seemsBandless(project, receiver) ? [] : [...input.lacking, ...contact.lacking]), ...beyond];
  return { contributions: finite.map((noise) => ownContribution(noise, measure)), lacking };
}

/** Something of it could not be read, which its budget says anyhow: that it has no band is no second mistake. */
function seemsBandless({ gaps }: Project, receiver: Receiver): boolean {
  return bandOf(receiver) === null && gaps.some(({ affects }) => affects !== null && affects.includes(receiver.subject.name));
}
