/**
 * What radio fields from outside bring to a receiver: for every contour that a field reaches, the worst incidence, polarisation and
 * frequency, through the receiver's own circuit.
 *
 * Formula   peak: sqrt(2) (1 + m) times the rms of the unmodulated field; rms: (1 + m) times it, m the depth of modulation
 * Source    IEC 61000-4-3: test levels are rms of the unmodulated carrier, 80 % AM has a crest of 1.8 times that, from memory
 */
import type { Ambient } from '../../board/model';
import { circuitTransfer } from '../../physics/circuit/circuitTransfer';
import { worstPickup } from '../../physics/fields/planeWavePickup';
import { bandTransfer } from '../../physics/noise/bandTransfer';
import { hertz, volts, voltsPerMetre, type Frequency } from '../../units/quantity';
import type { Counted } from '../contributions';
import { onGrid } from '../onGrid';
import { bandOf, type Receiver } from '../receivers';
import type { Contribution } from '../results';
import { shieldsInWords, throughShields } from '../shields/shielding';
import type { SolveCache } from '../solveCache';
import { worstOver } from '../worstOver';
import type { Pickup, PickupCircuit } from './pickups';

export function radiatedNoise(ambients: readonly Ambient[], pickups: readonly Pickup[], receiver: Receiver, measure: 'peak' | 'rms', cache: SolveCache): Counted {
  const contributions = ambients.flatMap((ambient) => pickups.map((pickup) => contributionOf(ambient, pickup, { receiver, measure, cache })));
  const finite = contributions.filter(({ value, errorBar }) => Number.isFinite(value) && Number.isFinite(errorBar));
  const beyond = contributions.filter((each) => !finite.includes(each)).map(({ from, where, place }) => ({ what: `what field ${from} brings by ${where} is beyond what can be computed`, place }));
  return { contributions: finite, lacking: beyond };
}

interface Wanted {
  readonly receiver: Receiver;
  readonly measure: 'peak' | 'rms';
  readonly cache: SolveCache;
}

function contributionOf(ambient: Ambient, pickup: Pickup, { receiver, measure, cache }: Wanted): Contribution {
  const { field, from, to, modulated, name } = ambient;
  const band = bandOf(receiver);
  const crest = (measure === 'peak' ? Math.SQRT2 : 1) * (1 + (modulated?.value ?? 0));
  const key = JSON.stringify([measure, receiver.leak, from.value, to.value, band, keyOf(pickup)]);
  const { whole, counted } = cache.inductance(`radiated ${key}`, () => {
    const range = { from: from.value, to: to.value };
    const received = receivedFrom(pickup, receiver, cache);
    const inside = band === null ? range : { from: hertz(Math.max(band.from, from.value)), to: hertz(Math.min(band.to, to.value)) };
    const unfiltered = worstOver(range, received).magnitude;
    if (band === null) return { whole: unfiltered, counted: unfiltered };
    if (measure === 'peak') return { whole: unfiltered, counted: worstOver(range, (frequency) => received(frequency) * bandTransfer(frequency, band)).magnitude };
    return { whole: unfiltered, counted: inside.to < inside.from ? 0 : worstOver(inside, received).magnitude };
  });
  const value = field.value * crest * counted;
  return {
    channel: 'radiated', from: name, cause: `field ${name}`, where: pickup.name, place: pickup.place, group: null,
    value: volts(value), unfiltered: band === null ? null : volts(field.value * crest * whole), errorBar: volts(pickupError * value), bounds: null,
    method: `line integral of the field around the ${pickup.kind === 'loop' ? 'loop' : 'trace and its return'}, worst incidence, polarisation and frequency`,
    assumptions: [...pickup.assumptions, ...shieldsInWords(pickup.shields), 'a plane wave; its voltage acts on the receiver’s ends as on a short circuit', ...(pickup.plane === null ? [] : ['its plane is endless, and reflects the field'])],
    coupling: null, spectrum: null,
  };
}

/** Of reading the field's voltage between the frequencies that it is solved for, and of the search for the worst. */
const pickupError = 0.02;

function keyOf({ contour, plane, variants, shields }: Pickup) {
  return [shields.map(({ sheet, slot, grounded }) => [sheet?.material, sheet?.thickness.value, slot?.value, grounded]), contour.form === 'circle' ? contour : [...contour.points], plane, variants.map(({ circuit, drives, terms }) => [circuit.nodes, circuit.shunts.map((shunt) => ({ ...shunt, resistance: String(shunt.resistance) })), circuit.branches, drives, terms])];
}

/** Volts for one volt per metre. */
function receivedFrom(pickup: Pickup, { leak }: Receiver, cache: SolveCache): (frequency: Frequency) => number {
  const { contour, plane, variants, shields } = pickup;
  const geometry = JSON.stringify([contour.form === 'circle' ? contour : [...contour.points], plane]);
  const around = onGrid((frequency) => cache.inductance(`pickup ${frequency} ${geometry}`, () => worstPickup(contour, { field: voltsPerMetre(1), frequency }, { plane })).voltage, { perDecade: 16, lowest: 0 });
  const transfers = variants.map((variant) => through(variant, leak));
  return (frequency) => around(frequency) * throughShields(shields, { kind: 'plane' }, frequency) * Math.max(...transfers.map((transfer) => transfer(frequency)));
}

function through({ circuit, drives, terms }: PickupCircuit, leak: number): (frequency: Frequency) => number {
  const transfer = circuitTransfer(circuit);
  const leaks = leak === 0 || terms.length < 2 ? [0] : [leak, -leak];
  return (frequency) => {
    const answers = drives.map(({ drive, share }) => ({ share, nodes: transfer(drive, frequency) ?? transfer(drive, hertz(frequency * (1 + 1e-6))) }));
    return Math.max(...leaks.map((mean) => {
      let [re, im] = [0, 0];
      for (const { share, nodes } of answers) {
        for (const { node, weight } of terms) {
          const factor = share * (weight + mean / terms.length);
          re += factor * (nodes?.[node - 1]?.re ?? 0);
          im += factor * (nodes?.[node - 1]?.im ?? 0);
        }
      }
      return Math.hypot(re, im);
    }));
  };
}
