/**
 * What the repeated edges of a source in a part of a run put into the bands of those that listen there in rms: the directions
 * in which it and they are driven, and what is assumed for sources that nobody stated, with the largest rms of each.
 */
import type { Signal } from '../../board/model';
import type { CoupledLines } from '../../physics/lines/lines';
import { prepareTransfer, type Drive } from '../../physics/lines/transfer';
import { transferAtHarmonics } from '../../physics/lines/transferAtHarmonics';
import { worstTransfer } from '../../physics/lines/worstTransfer';
import type { Band } from '../../physics/noise/receiverBand';
import { volts, type Voltage } from '../../units/quantity';
import { rmsOf } from '../heard';
import { bandOf } from '../receivers';
import { repeatedSpectra, type FoundSpectrum } from '../repeatedSpectrum';
import { edgesOf } from '../sources';
import { arrangementsFor, type Arrangement } from './arrangements';
import { slowInductance } from './balancingCurrent';
import { carriedError } from './carriedError';
import { listeners, type PartReceiver, type PartSource } from './partPlayers';
import type { RunPart } from './runParts';
import { lineKeyOf, sideOf } from './solvedLine';
import type { NoiseContext } from './worstNoise';

/** By the index of the part's receiver. */
export type SpectraByReceiver = ReadonlyMap<number, FoundSpectrum>;

export function repeatedNoise(part: RunPart, player: PartSource, receivers: readonly PartReceiver[], { roles, length, cache }: NoiseContext): SpectraByReceiver {
  const { signal } = player.source;
  const worst = new Map<number, FoundSpectrum>();
  if (signal.repeats === null || edgesOf(signal).length === 0) return worst;
  const moving = player.lines.map(({ index }) => index);
  for (const index of listeners(receivers, player)) {
    const receiver = receivers[index];
    const band = bandOf(receiver.receiver);
    if (receiver.receiver.toleratesRms === null || band === null) continue;
    const slowed = slowInductance(part, signal.repeats.frequency.value, cache);
    for (const arrangement of arrangementsFor(part, roles, moving, length)) {
      for (const inductance of slowed === null ? [part.matrices.inductance] : [part.matrices.inductance, slowed]) {
        const key = ['repeated', ...trainKey(player), band.from, band.to, receiver.receiver.leak, ...receiver.terms.flatMap(({ index: line, weight }) => [line, weight]), lineKeyOf({ part, slow: inductance === slowed, length, arrangement, moving: player.lines })].join(' ');
        const { found } = cache.line(key, () => ({ found: solve(part, inductance, { arrangement, player, receiver, band, length }) }));
        const known = worst.get(index);
        if (found !== null && (known === undefined || rmsOf(known.spectrum) < rmsOf(found.spectrum))) worst.set(index, found);
      }
    }
  }
  return worst;
}

function trainKey({ source: { signal } }: PartSource): readonly (number | string | undefined)[] {
  const { repeats } = signal;
  return [repeats?.frequency.value, repeats?.duty?.value, ...edgesOf(signal).flatMap(({ kind, voltage, current }) => [kind, voltage?.amplitude, voltage?.duration, current?.amplitude, current?.duration])];
}

interface Asked {
  readonly arrangement: Arrangement;
  readonly player: PartSource;
  readonly receiver: PartReceiver;
  readonly band: Band;
  readonly length: NoiseContext['length'];
}

function solve(part: RunPart, inductance: Float64Array, { arrangement, player, receiver, band, length }: Asked): FoundSpectrum | null {
  const { order, capacitance } = part.matrices;
  const { left, right, leftAcross, rightAcross } = arrangement;
  const lines: CoupledLines = { order, inductance, capacitance, length, left, right, leftAcross, rightAcross };
  const prepared = prepareTransfer(lines);
  const { signal } = player.source;
  const moved = (['voltage', 'current'] as const).filter((kind) => edgesOf(signal).some((edge) => edge[kind] !== null));
  const drives = moved.map((kind) => player.lines.map(({ index, sign }): Drive => ({ line: index, end: sideOf(arrangement, index, kind === 'voltage' ? 'source' : 'load'), kind, amplitude: sign })));
  const { terms, receiver: { leak } } = receiver;
  const leaks = leak === 0 || terms.length < 2 ? [0] : [leak, -leak];
  // The current's sign against the voltage is not known.
  const signs = moved.length === 1 ? [[1]] : [[1, 1], [1, -1]];
  const readings = leaks.map((share) => terms.map(({ index, weight }) => ({ line: index, place: `${sideOf(arrangement, index, 'load')}Termination` as const, factor: weight + share / terms.length })));
  const all = signs.flatMap((sign) => readings.map((reading) => ({ sign, reading })));
  const spectra = repeatedSpectra({ repeats: signal.repeats, trains: moved.map((kind) => trainOf(signal, kind)), signs: all.map(({ sign }) => sign) }, band, {
    at: (harmonics) => drives.map((of) => {
      const { phasors } = transferAtHarmonics(prepared, of, harmonics, readings);
      return all.map(({ reading }) => phasors[readings.indexOf(reading)]!);
    }),
    largestIn: (range) => {
      const largest = drives.map((of) => worstTransfer(prepared, of, range, readings).readings);
      return all.map(({ reading }) => largest.map((each) => each[readings.indexOf(reading)]!.magnitude));
    },
  });
  if (spectra === null) return null;
  const found = spectra.reduce((a, b) => (rmsOf(a.spectrum) < rmsOf(b.spectrum) ? b : a));
  return { ...found, errorBar: volts(found.errorBar + carried(part, player, receiver) * rmsOf(found.spectrum)) };
}

function trainOf(signal: Signal, kind: 'voltage' | 'current') {
  const edges = edgesOf(signal);
  return { rise: edges[0]?.[kind] ?? null, fall: edges[edges.length - 1]?.[kind] ?? null };
}

/** What couples by C or by L has at most the larger relative error of the two. */
function carried({ matrices }: RunPart, { lines }: PartSource, { terms }: PartReceiver): Voltage {
  return volts(Math.max(...lines.flatMap(({ index: aggressor }) => terms.map(({ index: victim }) => carriedError(matrices, { aggressor, victim, peak: 1, capacitive: 0, inductive: 0 })))));
}
