/** What a signal does to a circuit by its voltage, and by the current that it draws. */
import type { Signal, SignalCurrent } from '../../board/model';
import type { Drive } from '../../physics/circuit/circuit';
import { edgesOf, sinesOf, type Swing } from '../sources';
import type { Feed } from './lumpedPath';

export function voltageFeed(signal: Signal, drive: Drive, sign: 1 | -1): Feed {
  return { drive, sign, eitherSign: false, edges: swingsOf(signal, 'voltage'), sines: sinesOf(signal).filter((sine) => sine.drive === 'voltage') };
}

/** `current` stands for what the signal itself states, where another is stated in its place. */
export function currentFeed(signal: Signal, drive: Drive, sign: 1 | -1, { eitherSign = false, current = null }: { readonly eitherSign?: boolean; readonly current?: SignalCurrent | null } = {}): Feed {
  const drawing: Signal = current === null ? signal : { ...signal, current };
  return { drive, sign, eitherSign, edges: swingsOf(drawing, 'current'), sines: sinesOf(drawing).filter((sine) => sine.drive === 'current') };
}

export function isSilent({ edges: { rise, fall }, sines }: Feed): boolean {
  return rise === null && fall === null && sines.length === 0;
}

function swingsOf(signal: Signal, what: 'voltage' | 'current'): Feed['edges'] {
  const edges = edgesOf(signal);
  const swing = (edge: (typeof edges)[number] | undefined): Swing<number> | null => edge?.[what] ?? null;
  // A single edge is its own mirror image.
  return { rise: swing(edges.find(({ kind }) => kind === 'rise') ?? edges[0]), fall: swing(edges.find(({ kind }) => kind === 'fall') ?? edges[0]) };
}
