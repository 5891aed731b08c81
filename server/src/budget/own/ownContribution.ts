/** A kind of a receiver's own noise as it counts in its budget: each is one cause, unrelated to everything else. */
import { gaussianCrest } from '../../physics/noise/gaussianCrest';
import type { NoiseVoltage } from '../../physics/noise/noiseVoltage';
import { volts } from '../../units/quantity';
import type { Contribution } from '../results';

export type OwnChannel = 'thermal' | 'amplifier' | 'flicker' | 'contact';

export interface OwnNoise {
  readonly channel: OwnChannel;
  readonly noise: NoiseVoltage;
  readonly method: string;
  readonly assumptions: readonly string[];
}

export function ownContribution({ channel, noise: { rms, errorBar }, method, assumptions }: OwnNoise, measure: 'peak' | 'rms'): Contribution {
  const crest = measure === 'peak' ? gaussianCrest : 1;
  return {
    channel,
    from: null,
    cause: `own ${channel}`,
    where: null,
    place: null,
    group: null,
    value: volts(crest * rms),
    unfiltered: null,
    errorBar: volts(crest * errorBar),
    bounds: null,
    method,
    assumptions: measure === 'peak' ? [...assumptions, `its peak is ${gaussianCrest} times its rms value, exceeded 0.1 % of the time`] : assumptions,
    coupling: null,
    spectrum: null,
  };
}

/** Of the ways in which what nobody stated can be. */
export function largestNoise(noises: readonly NoiseVoltage[]): NoiseVoltage | null {
  return noises.reduce<NoiseVoltage | null>((largest, each) => (largest === null || largest.rms < each.rms ? each : largest), null);
}
