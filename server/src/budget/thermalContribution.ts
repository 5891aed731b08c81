/**
 * A receiver's own thermal noise as it counts in a peak budget. The load's resistance counts as a real, warm
 * resistor, which is on the safe side for an active input; without `band` only a capacitance limits it.
 */
import type { Net, Project } from '../board/model';
import { gaussianCrest, thermalNoise } from '../physics/noise/thermalNoise';
import { farads, kelvins, ohms, volts } from '../units/quantity';
import { loadEnd, sourceEnd } from './ends';
import type { Contribution } from './results';
import type { Roles } from './roles';

/** 25 °C, the language's default. */
const defaultTemperature = kelvins(298.15);

export function thermalContribution(project: Project, roles: Roles, net: Net): Contribution | null {
  const role = roles.get(net);
  if (role === undefined) return null;
  // An open source is the noisier of the two that are assumed where none is stated; a receiver never ends in its characteristic resistance.
  const condition = { moves: false, unstated: 'open', characteristic: ohms(NaN) } as const;
  const source = sourceEnd(role, condition);
  const load = loadEnd(role, condition);
  const conductance = 1 / source.resistance + 1 / load.resistance;
  const band = net.band === null ? null : { from: net.band.from.value, to: net.band.to.value };
  const rms = thermalNoise({
    resistance: ohms(1 / conductance),
    capacitance: farads(source.capacitance + load.capacitance),
    temperature: project.board.temperature?.value ?? defaultTemperature,
    band,
  });
  if (rms === null || !(0 < rms && rms < Infinity)) return null;
  return {
    channel: 'thermal',
    from: null,
    where: null,
    place: null,
    group: null,
    value: volts(gaussianCrest * rms),
    unfiltered: null,
    errorBar: volts(0),
    bounds: null,
    method: band === null ? 'thermal noise, kT/C' : 'thermal noise of source and load over the band',
    assumptions: [`its peak is ${gaussianCrest} times its rms value, exceeded 0.1 % of the time`],
    coupling: null,
  };
}
