/**
 * Contact noise of a receiver's resistors. Each net of a pair has such resistors as the pair states, where it states none itself, and
 * those of one know nothing of those of the other. It counts whole: nothing that stands beside a resistor is taken to lessen it.
 */
import { contactNoise } from '../../physics/noise/contactNoise';
import { closedForm, noiseVoltage } from '../../physics/noise/noiseVoltage';
import type { Band } from '../../physics/noise/receiverBand';
import type { Receiver } from '../receivers';
import type { OwnCircuits } from './ownCircuits';
import { largestNoise } from './ownContribution';
import type { OwnCounted } from './ownInput';

export function ownContact({ subject, kind, terms }: Receiver, { readings }: OwnCircuits, band: Band | null): OwnCounted {
  const stating = terms.flatMap(({ net }, term) => {
    const contact = net.contact ?? subject.contact;
    return contact === null ? [] : [{ contact, term }];
  });
  const place = stating[0]?.contact.place ?? null;
  if (stating.length === 0) return { noises: [], lacking: [] };
  const lacking = (why: string) => ({ noises: [], lacking: [{ what: `the contact noise of its resistors is not counted: ${why}`, place }] });
  if (band === null) return lacking(`${subject.name} has no \`band\``);
  if (band.from === 0 && stating.some(({ contact }) => contact.across.value !== 0)) return lacking(`it has no end towards 0 Hz, where the band of ${subject.name} begins`);
  const squares = stating.map(({ contact, term }) => ({ term, square: contactNoise({ index: contact.index.value, across: contact.across.value }, band) ** 2 }));
  const noise = largestNoise(readings.map(({ weights }) => noiseVoltage(squares.map(({ term, square }) => closedForm(weights[term]! ** 2 * square)))));
  if (noise === null || noise.rms === 0) return { noises: [], lacking: [] };
  const assumptions = ['nothing beside its resistors lessens it', ...(kind === 'net' || stating.length < 2 ? [] : ['its two nets have such resistors each, and their noises are unrelated'])];
  return { noises: [{ channel: 'contact', noise, method: 'noise index over the decades of the band', assumptions }], lacking: [] };
}
