/**
 * Who listens on a board, and to what: a net at its load end; a pair to the difference of its nets, and to their mean. Whatever arrives
 * over the two nets of a pair adds with its sign, in time.
 */
import type { Given, Net, Pair, Project, Signal } from '../board/model';
import type { Band } from '../physics/noise/receiverBand';
import type { Time, Voltage } from '../units/quantity';

export interface Receiver {
  readonly subject: Net | Pair;
  readonly kind: 'net' | 'pair' | 'common';
  readonly terms: readonly ReceiverTerm[];
  /** What part of the mean reads as a difference; its sign is not known. 0 where none is stated. */
  readonly leak: number;
  readonly toleratesPeak: Given<Voltage> | null;
  readonly toleratesRms: Given<Voltage> | null;
}

/** What is read is the sum of the nets' voltages, each times its weight. */
export interface ReceiverTerm {
  readonly net: Net;
  readonly weight: number;
}

export function receiversOf(project: Project): readonly Receiver[] {
  return [...[...project.nets.values()].flatMap(netReceiver), ...[...project.pairs.values()].flatMap(pairReceivers)];
}

function netReceiver(net: Net): readonly Receiver[] {
  const { toleratesPeak, toleratesRms } = net;
  return toleratesPeak === null && toleratesRms === null ? [] : [{ subject: net, kind: 'net', terms: [{ net, weight: 1 }], leak: 0, toleratesPeak, toleratesRms }];
}

function pairReceivers(pair: Pair): readonly Receiver[] {
  const { plus, minus, rejects, commonTolerates: common, toleratesPeak, toleratesRms } = pair;
  const terms = (one: number, other: number) => [...(plus === null ? [] : [{ net: plus, weight: one }]), ...(minus === null || minus === plus ? [] : [{ net: minus, weight: other }])];
  const found: Receiver[] = [];
  if (toleratesPeak !== null || toleratesRms !== null) {
    found.push({ subject: pair, kind: 'pair', terms: terms(1, -1), leak: rejects === null ? 0 : 10 ** (-rejects.value / 20), toleratesPeak, toleratesRms });
  }
  if (common !== null) {
    const tolerates = { peak: common.measure === 'peak' ? common.voltage : null, rms: common.measure === 'rms' ? common.voltage : null };
    found.push({ subject: pair, kind: 'common', terms: terms(0.5, 0.5), leak: 0, toleratesPeak: tolerates.peak, toleratesRms: tolerates.rms });
  }
  return found;
}

export function bandOf({ subject: { band } }: Receiver): Band | null {
  return band === null ? null : { from: band.from.value, to: band.to.value };
}

/** Of the group that it samples after, only what is left this long after its edge counts; null where all of a source's does. */
export function sampledAfter({ subject: { samples } }: Receiver, { switchesWith }: Signal): Time | null {
  return samples !== null && samples.group === switchesWith ? samples.delay.value : null;
}
