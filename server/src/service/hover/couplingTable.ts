/** What nets of a run put on each other, and what those numbers rest on. */
import type { Coupling } from '../../budget/results';
import { errorInText, inText } from '../../units/inText';
import { escaped, table } from './markdown';

const couplingsShown = 12;

/** Largest first. */
export function couplingTable(couplings: readonly Coupling[]): string {
  const sorted = [...couplings].sort((a, b) => sizeOf(b) - sizeOf(a));
  const rows = sorted.slice(0, couplingsShown).map((coupling) => [
    `${escaped(coupling.aggressor.name)} → ${escaped(coupling.victim.name)}`,
    `**${voltage(coupling.atReceiver)}** ${errorInText(coupling.errorBar, coupling.atReceiver, 'voltage')}${coupling.counted === null ? '' : `, ${voltage(coupling.counted)} counts`}`,
    voltage(coupling.nearEnd),
    voltage(coupling.farEnd),
    voltage(coupling.capacitivePart),
    voltage(coupling.inductivePart),
    momentInWords(coupling),
    coupling.model,
  ]);
  const rest = sorted.length - rows.length;
  const words = table(['from → to', 'at the receiver', 'near end', 'far end', 'capacitive', 'inductive', 'peak', 'acts as'], rows);
  return [words, ...(rest === 0 ? [] : [`and ${rest} smaller ones`]), ...(sorted.every(partsAddUp) ? [] : [partsNote])].join('\n\n');
}

/** An engineer who adds the two parts and gets another number must not think that the number is wrong. */
const partsNote = 'The capacitive and the inductive part are those of a short line at its peak. On a longer one they come at different times, and do not add up to the whole.';

function partsAddUp({ capacitivePart, inductivePart, atReceiver }: Coupling): boolean {
  return Math.abs(capacitivePart + inductivePart - atReceiver) <= 0.1 * Math.abs(atReceiver);
}

function sizeOf({ counted, atReceiver }: Coupling): number {
  return Math.abs(counted ?? atReceiver);
}

function momentInWords({ edge, frequency, peakTime, widthHalf }: Coupling): string {
  if (frequency !== null) return `a sine at ${inText(frequency, 'frequency')}`;
  return peakTime === null || widthHalf === null ? '' : `${inText(peakTime, 'time')} after the ${edge} begins, ${inText(widthHalf, 'time')} wide`;
}

function voltage(value: number): string {
  return inText(value, 'voltage');
}

const assumptionsShown = 6;

export function assumptionsOf(couplings: readonly Coupling[]): string | null {
  const said = [...new Set(couplings.flatMap(({ assumptions }) => assumptions))];
  if (said.length === 0) return null;
  const rest = said.length - assumptionsShown;
  return `It rests on:\n\n${said.slice(0, assumptionsShown).map((words) => `- ${escaped(words)}`).join('\n')}${0 < rest ? `\n- and ${rest} more` : ''}`;
}
