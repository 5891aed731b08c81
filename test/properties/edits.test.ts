/**
 * What a session answers is a function of the texts alone: after any edits, in any order, it says what a session that
 * never saw another text says, places included.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { Session, type Analysis } from '../../server/src/service/session';
import { generatedBoard, seeded, type Random } from '../support/generatedBoard';

const path = 'board.quiet';

/** What a net may state besides; each changes what its runs are computed with, and nothing else. */
const properties = ['swing 5 V', 'tolerates 3 mV peak', 'tolerates 2 mV rms', 'both ways', 'band 1 kHz to 1 MHz', 'length 90 mm', 'fall 3 ns', 'repeats 10 kHz', 'source 47 ohm', 'load 1 kohm, 3 pF', 'switches with clock', 'sine 1 V rms 1 MHz'];

/** What fingers do besides: half a word, a brace too many. */
const fragments = ['7', '.', ' ', '\n', '}', '{', ';', '#', '"', 'waive over-budget "seen"', 'net S9 { swing 1 V; rise 1 ns }'];

function edited(text: string, random: Random): string {
  const kind = random.next();
  if (kind < 0.35) return replacedOne(text, /\d+(?:\.\d+)?/gu, random, () => random.pick(['0.2', '3', '12', '0.45', '1.30', '0', '150']));
  if (kind < 0.6) return replacedOne(text, /(?<=^net [^{}]*\{[^{}]*)\}/gmu, random, () => `; ${random.pick(properties)} }`);
  if (kind < 0.7) return replacedOne(text, /(?<=trace [^;\n]* (?:mm|mil|um))(?: reversed)?/gu, random, (old) => (old === '' ? random.pick([' reversed', ' after 2 mm']) : ''));
  if (kind < 0.75) return replacedOne(text, / stitched 3 mm|; working 48 V dc|, 100 pF|flat/gu, random, () => '');
  const at = Math.floor(random.next() * (text.length + 1));
  if (kind < 0.82) return text.slice(0, at) + random.pick(fragments) + text.slice(at);
  if (kind < 0.9) return text.slice(0, at) + text.slice(at + 1 + Math.floor(random.next() * 6));
  const lines = text.split('\n');
  return lines.toSpliced(Math.floor(random.next() * lines.length), random.chance(0.5) ? 1 : 0, random.pick(lines)).join('\n');
}

function replacedOne(text: string, pattern: RegExp, random: Random, by: (old: string) => string): string {
  const all = [...text.matchAll(pattern)];
  if (all.length === 0) return `${text}\n`;
  const { index, 0: old } = random.pick(all);
  return text.slice(0, index) + by(old) + text.slice(index + old.length);
}

/** Getters read, and the count of the work left out: it is what the sessions differ in. */
function plain({ project, evaluation, findings }: Analysis) {
  const runs = evaluation.runs.map((run) => ({ ...run, couplings: run.couplings.map((coupling) => ({ ...coupling })) }));
  const budgets = evaluation.budgets.map((budget) => ({ ...budget, contributions: budget.contributions.map((each) => ({ ...each, coupling: each.coupling === null ? null : { ...each.coupling } })) }));
  return { project, evaluation: { ...evaluation, work: null, runs, budgets }, findings };
}

describe('a session', () => {
  it('answers after 300 random edits as one that was opened on the text', () => {
    const random = seeded(20);
    const session = new Session();
    let text = '';
    for (let step = 0; step < 300; step += 1) {
      // A board wears out under random edits; the session goes on to the next one.
      text = step % 12 === 0 ? generatedBoard(400 + step) : edited(text, random);
      session.setText(path, text);
      const fresh = new Session();
      fresh.setText(path, text);
      const [seen, expected] = [session, fresh].map((each) => plain(each.analyse(path)));
      assert.deepStrictEqual(seen!.findings, expected!.findings, `findings at step ${step}:\n${text}`);
      assert.deepStrictEqual(seen, expected, `step ${step}:\n${text}`);
    }
  });

  it('answers as before when an edit is undone', () => {
    const random = seeded(21);
    const session = new Session();
    for (let board = 0; board < 6; board += 1) {
      const text = generatedBoard(900 + board);
      session.setText(path, text);
      const before = plain(session.analyse(path));
      for (let step = 0; step < 5; step += 1) {
        session.setText(path, edited(text, random));
        session.analyse(path);
      }
      session.setText(path, text);
      assert.deepStrictEqual(plain(session.analyse(path)), before);
    }
  });
});
