/**
 * A rename changes a name and nothing else: the board says afterwards what it said before, up to the name, and renaming back gives the
 * first text, to the last character.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { editedText } from '../../server/src/service/editedText';
import { renameEdits } from '../../server/src/service/rename';
import { Session } from '../../server/src/service/session';
import type { NameRecord, NameSet } from '../../server/src/board/model';
import { everyKindOfBoard } from '../support/everyKindOfBoard';
import { generatedBoard, seeded } from '../support/generatedBoard';

const path = 'board.quiet';
const boards = Number(process.env['BOARDS'] ?? 60);
const newNames = ['NEW', '3V3', 'new name', '"', 'µΩ 🔌', '__proto__', 'and', '#7', 'X[0..1]', 'GND2'];

/** With a range, a guard, a family, an ambient field, a shield and a waiver besides. */
function text(seed: number): string {
  if (seed % 3 === 0) return generatedBoard(seed);
  const declarations = everyKindOfBoard(seed);
  const more = `family F { swing 1 V; rise 2 ns }
net E[0..3] is F
pair Q { plus E0; minus E1; tolerates 5 mV peak }
run bus on TOP for 12 mm { trace E[0..3] 0.1 mm spaced 0.15 mm; gap 0.3 mm; guard AGND 0.2 mm stitched 2 mm; gap 0.3 mm; trace V 0.2 mm }
shield lid { covers V; covers E[1..2]; sheet copper 0.5 mm; slot 3 mm; grounded }
ambient radio { field 3 V/m from 80 MHz to 1 GHz }
waive over-budget on V because "E0 is quiet then"`;
  const whole = `${declarations.join('\n')}\n${more}\n`;
  return seed % 2 === 0 ? whole.replaceAll('\n', '\r\n') : whole;
}

describe('a rename', () => {
  it('leaves what the board says as it is, but for the name, and is undone by another', () => {
    let [done, refused] = [0, 0];
    for (let seed = 1; seed <= boards; seed += 1) {
      const session = new Session();
      session.setText(path, text(seed));
      const records = [...session.project(path).names.values()].flatMap((of) => [...of.values()]);
      const random = seeded(seed);
      const record = random.pick(records);
      const [place] = [...record.declarations, ...record.uses];
      if (place === undefined) continue;
      const before = session.text(path)!;
      const written = before.slice(place.span.start, place.span.end);
      const range = written.includes('..');
      const name = range ? random.pick(['Z[0..3]', 'E[4..7]', 'bus[[3..0]]']) : random.pick(newNames.filter((each) => !each.includes('..')));
      const said = `seed ${seed}, ${record.set} ${written} to ${name}:\n${before}`;
      const names = snapshot(session, record.set);
      const edits = renameEdits(session, path, place.span.start, name);
      if ('refused' in edits) {
        refused += 1;
        assert.match(edits.refused, /built into|is part of|names a/, said);
        continue;
      }
      session.setText(path, editedText(before, edits.edits));
      const to = record.name;
      const by = range ? rangeMap(written, name) : new Map([[to, unquoted(name)]]);
      assert.deepEqual(inOneOrder(snapshot(session, record.set)), inOneOrder(renamed(names, by)), said);
      const backAt = edits.edits[0]!;
      const back = renameEdits(session, path, backAt.span.start, range ? written : quotedAlways(record));
      assert.ok('edits' in back, 'refused' in back ? `${back.refused} ${said}` : '');
      assert.equal(editedText(session.text(path)!, back.edits), before, said);
      done += 1;
    }
    assert.ok(boards / 2 < done, `${done} done, ${refused} refused`);
  });
});

const unquoted = (typed: string) => (2 <= typed.length && typed.startsWith('"') && typed.endsWith('"') ? typed.slice(1, -1).replaceAll('""', '"') : typed);
const quotedAlways = ({ name }: NameRecord) => `"${name.replaceAll('"', '""')}"`;

function rangeMap(from: string, to: string): ReadonlyMap<string, string> {
  const of = (range: string) => { const [, prefix, first, last] = /^(.*?)\[+(\d+)\.\.(\d+)/.exec(range)!; const step = Number(first) < Number(last) ? 1 : -1; return [0, 1, 2, 3].map((at) => (range.includes('[[') ? `${prefix}[${Number(first) + step * at}]` : `${prefix}${Number(first) + step * at}`)); };
  const names = of(to);
  return new Map(of(from).map((name, at) => [name, names[at]!]));
}

/** Everything that is computed, with the names that stand beside it. */
function snapshot(session: Session, set: NameSet) {
  const { project, evaluation, findings } = session.analyse(path);
  const own = (of: NameSet, name: string | null | undefined) => (name == null ? null : of === set ? { named: name } : name);
  return {
    budgets: evaluation.budgets.map(({ subject, kind, measure, total, errorBar, marginDb, verdict, contributions }) => ({
      subject: own('signal', subject.name), kind, measure, total, errorBar, marginDb, verdict,
      contributions: contributions.map(({ channel, from, value, unfiltered, group }) => ({ channel, from: own(channel === 'radiated' ? 'ambient' : 'signal', from), value, unfiltered, group: own('group', group) })),
    })),
    runs: evaluation.runs.map(({ run, matrices, couplings }) => ({ name: own('run', run.name), matrices, layers: run.rows.map(({ layer }) => own('layer', layer.name)), couplings: couplings.map(({ aggressor, victim, atReceiver }) => ({ aggressor: own('signal', aggressor.name), victim: own('signal', victim.name), atReceiver })) })),
    loops: evaluation.loops.map(({ loop, area, inductance }) => ({ name: own('signal', loop.name), area, inductance })),
    findings: findings.map(({ rule, severity, waived, value, limit, subject }) => ({ rule, severity, waived, value, limit, subject: subject === null ? null : own(setOf(subject.kind), subject.name) })),
    errors: project.errors.length,
  };
}

const setOf = (kind: string) => (kind === 'net' || kind === 'pair' || kind === 'loop' ? 'signal' : kind) as NameSet;
/** Of equal things, the names decide which comes first. */
function inOneOrder({ findings, budgets, ...rest }: ReturnType<typeof snapshot>) {
  return { ...rest, findings: sorted(findings), budgets: budgets.map((budget) => ({ ...budget, contributions: sorted(budget.contributions) })) };
}

function sorted<T>(all: readonly T[]): readonly T[] {
  return all.map((each) => ({ each, key: JSON.stringify(each) })).sort((a, b) => (a.key < b.key ? -1 : 1)).map(({ each }) => each);
}

function renamed<T>(value: T, by: ReadonlyMap<string, string>): T {
  if (Array.isArray(value)) return value.map((each) => renamed(each, by)) as T;
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value)) return value;
  if ('named' in value) return { named: by.get(value.named as string) ?? value.named } as T;
  return Object.fromEntries(Object.entries(value).map(([key, each]) => [key, renamed(each, by)])) as T;
}
