/**
 * What a receiver reads its own noise from: the resistances and capacitances at the ends of its nets, and what lies across a pair, in
 * every way in which what nobody stated can be. All of a net is one node: copper between its ends is short for its own noise.
 */
import { farads, ohms } from '../../units/quantity';
import type { NetworkReading } from '../../physics/noise/noiseNetwork';
import { assumptionsInWords, hasUnstatedSource, loadEnd, sourceEnd, type UnstatedSource } from '../ends';
import type { Receiver } from '../receivers';
import type { Role, Roles } from '../roles';

export interface OwnCircuits {
  /** The nodes are the receiver's terms, in their order; the larger result counts. */
  readonly readings: readonly NetworkReading[];
  readonly assumptions: readonly string[];
}

export function ownCircuits(receiver: Receiver, roles: Roles): OwnCircuits {
  const terms = receiver.terms.map(({ net, weight }) => ({ role: roles.get(net)!, weight }));
  const leaks = receiver.leak === 0 || terms.length < 2 ? [0] : [receiver.leak, -receiver.leak];
  const weights = leaks.map((leak) => terms.map(({ weight }) => weight + leak / terms.length));
  const listening = terms.map(({ role }) => role);
  const networks = unstatedSources(listening).map((unstated) => shuntsOf(listening, unstated));
  return {
    readings: networks.flatMap((shunts) => weights.map((each) => ({ nodes: terms.length, shunts, weights: each }))),
    assumptions: [...assumptionsInWords(listening), ...listening.flatMap(({ net, pair }) => (receiver.kind === 'net' && pair?.across != null ? [`what lies across ${pair.name} is not taken to lessen the noise of ${net.name} alone`] : []))],
  };
}

/** For each net; two nets of a pair need not be alike in what nobody stated. */
function unstatedSources(roles: readonly Role[]): readonly (readonly UnstatedSource[])[] {
  return roles.reduce<readonly (readonly UnstatedSource[])[]>((all, role) => {
    const here: readonly UnstatedSource[] = hasUnstatedSource(role) ? ['short', 'open'] : ['none'];
    return all.flatMap((before) => here.map((each) => [...before, each]));
  }, [[]]);
}

function shuntsOf(roles: readonly Role[], unstated: readonly UnstatedSource[]): NetworkReading['shunts'] {
  const ends = roles.flatMap((role, at) => {
    // It listens now. A receiver never ends in its characteristic resistance.
    const condition = { moves: false, unstated: unstated[at]!, characteristic: ohms(NaN) };
    return [sourceEnd(role, condition), loadEnd(role, condition)].map((end) => ({ node: at + 1, to: 0, ...end }));
  });
  const across = roles.length === 2 ? (roles[0]!.pair?.across ?? null) : null;
  return across === null ? ends : [...ends, { node: 1, to: 2, resistance: across.resistance?.value ?? ohms(Infinity), capacitance: across.capacitance?.value ?? farads(0) }];
}
