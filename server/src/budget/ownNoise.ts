/**
 * A receiver's own thermal noise as it counts in its budget. The load's resistance counts as a real, warm resistor,
 * which is on the safe side for an active input; without `band` only a capacitance limits it.
 */
import type { Project } from '../board/model';
import { gaussianCrest, thermalNoise } from '../physics/noise/thermalNoise';
import { farads, ohms, volts } from '../units/quantity';
import { boardTemperature } from './boardTemperature';
import type { Counted } from './contributions';
import { loadEnd, sourceEnd } from './ends';
import { absent } from './notYetCounted';
import { bandOf, type Receiver } from './receivers';
import type { Contribution, Unaccounted } from './results';
import type { Roles } from './roles';




export function ownNoise(project: Project, roles: Roles, receiver: Receiver, measure: 'peak' | 'rms'): Counted {
  const { subject, kind } = receiver;
  const lacking: Unaccounted[] = [];
  if (kind !== 'net') lacking.push(absent(`the thermal noise of pair ${subject.name}`, subject.place));
  if (subject.noise !== null && kind !== 'common') lacking.push(absent('the noise of its input', subject.noise.place));
  if (subject.contact !== null && kind !== 'common') lacking.push(absent('the contact noise of its resistors', subject.contact.place));
  const thermal = kind === 'net' ? thermalContribution(project, roles, receiver, measure) : null;
  return { contributions: thermal === null ? [] : [thermal], lacking };
}

function thermalContribution(project: Project, roles: Roles, receiver: Receiver, measure: 'peak' | 'rms'): Contribution | null {
  const role = roles.get(receiver.terms[0]!.net);
  if (role === undefined) return null;
  // An open source is the noisier of the two that are assumed where none is stated; a receiver never ends in its characteristic resistance.
  const condition = { moves: false, unstated: 'open', characteristic: ohms(NaN) } as const;
  const source = sourceEnd(role, condition);
  const load = loadEnd(role, condition);
  const conductance = 1 / source.resistance + 1 / load.resistance;
  const band = bandOf(receiver);
  const rms = thermalNoise({
    resistance: ohms(1 / conductance),
    capacitance: farads(source.capacitance + load.capacitance),
    temperature: boardTemperature(project),
    band,
  });
  if (rms === null || !(0 < rms && rms < Infinity)) return null;
  return {
    channel: 'thermal',
    from: null,
    cause: 'own thermal',
    where: null,
    place: null,
    group: null,
    value: volts(measure === 'peak' ? gaussianCrest * rms : rms),
    unfiltered: null,
    errorBar: volts(0),
    bounds: null,
    method: band === null ? 'thermal noise, kT/C' : 'thermal noise of source and load over the band',
    assumptions: measure === 'peak' ? [`its peak is ${gaussianCrest} times its rms value, exceeded 0.1 % of the time`] : [],
    coupling: null,
    spectrum: null,
  };
}
