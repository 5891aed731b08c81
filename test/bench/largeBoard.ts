/**
 * A board of hundreds of runs in one file, seeded: what a keystroke is measured on. Every run has numbers of its
 * own, so that nothing is shared by chance; receivers lie in several runs and beside several sources, as on a board.
 */
import { seeded, type Random } from '../support/generatedBoard';

export interface LargeBoard {
  readonly text: string;
  /** Where the number of each gap stands, in the order of the text. */
  readonly gaps: readonly { readonly start: number; readonly end: number }[];
}

export function largeBoard(runs: number, seed = 1): LargeBoard {
  const random = seeded(seed);
  const pairs = Math.ceil(runs / 5);
  const names = Array.from({ length: pairs }, (_, index) => index);
  const text = [
    '# a made-up board: every run has numbers of its own',
    'board large { combine worst; headroom 6 dB; clearance 0.12 mm }',
    'stackup {\n  mask 20 um er 3.5 flat\n  copper TOP 35 um\n  prepreg 0.2 mm er 4.2\n  plane GND 18 um\n}',
    ...names.map((index) => `## Drives the load of channel ${index}.\nnet DRIVE_${index} {\n  swing ${random.pick(['3.3 V', '5 V', '12 V'])}; rise ${random.pick(['2 ns', '5 ns', '20 ns'])}\n  source ${random.pick(['10 ohm', '33 ohm'])}; load ${random.pick(['10 kohm, 20 pF', '1 kohm', '50 ohm'])}\n}`),
    ...names.map((index) => `net SENSE_${index} {\n  source ${random.pick(['50 ohm', '1 kohm'])}\n  load ${random.pick(['1 Mohm, 10 pF', '10 kohm', '50 ohm'])}\n  tolerates ${random.pick(['50 mV', '0.3 V', '0.8 V'])} peak  # by its comparator\n}`),
    ...Array.from({ length: runs }, (_, index) => runOf(random, index, pairs)),
  ].join('\n\n');
  return { text: `${text}\n`, gaps: [...text.matchAll(/gap +(\d+\.\d+) mm/g)].map((match) => ({ start: match.index + match[0].indexOf(match[1]!), end: match.index + match[0].indexOf(match[1]!) + match[1]!.length })) };
}

function runOf(random: Random, index: number, pairs: number): string {
  const drive = () => `trace DRIVE_${Math.floor(random.next() * pairs)} 0.25 mm`;
  const gap = () => `gap   ${random.between(0.15, 1.2).toFixed(4)} mm`;
  const sense = `trace SENSE_${Math.floor(random.next() * pairs)} 0.15 mm`;
  const rows = random.chance(0.6) ? [drive(), gap(), sense] : [drive(), gap(), sense, gap(), drive()];
  return `run channel-${index} on TOP for ${random.between(4, 60).toFixed(2)} mm {\n${rows.map((row) => `  ${row}`).join('\n')}\n}`;
}
