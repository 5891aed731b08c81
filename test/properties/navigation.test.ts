/**
 * Whatever stands in a text, finished or not, what is asked about a point of it is answered: nothing throws, a rename's edits fit the
 * text and make no new mistakes, and the forms of statements name what is due.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { disturbedBy, disturbs } from '../../server/src/service/disturbances';
import { partiesAt } from '../../server/src/service/disturbances/partiesAt';
import { editedText } from '../../server/src/service/editedText';
import { highlights } from '../../server/src/service/highlights';
import { lenses } from '../../server/src/service/lenses';
import { links } from '../../server/src/service/links';
import { renameEdits, renameTarget } from '../../server/src/service/rename';
import { Session } from '../../server/src/service/session';
import { beginsValues, signaturesAt } from '../../server/src/service/signatures';
import { workspaceSymbols } from '../../server/src/service/workspaceSymbols';
import { everyKindOfBoard } from '../support/everyKindOfBoard';
import { seeded, type Random } from '../support/generatedBoard';

const texts = Number(process.env['BOARDS'] ?? 60);
const path = 'board.quiet';
const fragments = ['7', '"', ' ', '\r\n', '}', '{', ';', '#', '(', ',', '😀', 'net A is A', 'net D[0..3] is F', 'trace D[0..1] 1 mm', 'waive over-budget on A because "x"', 'use "board.quiet"', 'use "parts.quiet"', '__proto__', 'run A on TOP for 1 mm { trace A 1 mm }', 'family F is F { }', '[0..', '1e999 mm'];

function mangled(text: string, random: Random): string {
  let changed = text;
  for (let n = Math.floor(random.next() * 6); 0 < n; n -= 1) {
    const at = Math.floor(random.next() * (changed.length + 1));
    changed = random.chance(0.6) ? `${changed.slice(0, at)}${random.pick(fragments)}${changed.slice(at)}` : changed.slice(0, at) + changed.slice(at + Math.floor(random.next() * 20));
  }
  return changed;
}

describe('asked about any point of any text', () => {
  it('it is answered', () => {
    let [renamed, refused, shown, disturbances] = [0, 0, 0, 0];
    for (let seed = 1; seed <= texts; seed += 1) {
      const random = seeded(seed);
      const session = new Session();
      const text = mangled(`use "parts.quiet"\nnet D[0..3] is F\n${everyKindOfBoard(seed).join('\n')}\n`, random);
      session.setText(path, text);
      session.setText('parts.quiet', 'family F { once }\n');
      assert.ok(Array.isArray(links(session, path)) && 0 < workspaceSymbols(session, 'f').length);
      for (const { title, place } of lenses(session, path, () => true)) assert.ok(title !== '' && place.span.end <= text.length);
      const names = [...text.matchAll(/(?:net|trace|run|carries|senses|between|is|on) (?=\S)/g)].map(({ index, 0: word }) => index + word.length);
      for (let n = 0; n < 12; n += 1) {
        const offset = n < 6 || names.length === 0 ? Math.floor(random.next() * (text.length + 1)) : random.pick(names);
        const said = `seed ${seed} at ${offset}:\n${text}`;
        for (const { span } of highlights(session, path, offset)) assert.ok(span.start <= span.end && span.end <= text.length, said);
        beginsValues(session, path, offset);
        for (const { label, parameters, active } of signaturesAt(session, path, offset)) {
          shown += 1;
          assert.ok(active < parameters.length && parameters.every(({ start, end }) => 0 < start && start < end && end <= label.length), `${label} ${said}`);
        }
        for (const party of partiesAt(session, path, offset)) {
          for (const { detail, rows } of [...disturbedBy(session, party), ...disturbs(session, party)]) {
            disturbances += 1;
            assert.ok(0 < rows.length && !/NaN|undefined|null/.test(detail), `${detail} ${said}`);
          }
        }
        const target = renameTarget(session, path, offset);
        const edits = renameEdits(session, path, offset, 'name' in target && target.name.includes('..') ? 'NEW[0..3]' : 'a new name');
        if ('refused' in edits) {
          refused += 1;
          assert.match(edits.refused, /^[^\n]+[.]$/, said);
          continue;
        }
        assert.ok('span' in target, said);
        renamed += 1;
        const after = new Session();
        after.setText('parts.quiet', editedText(session.text('parts.quiet')!, edits.edits.filter((edit) => edit.path !== path)));
        after.setText(path, editedText(text, edits.edits.filter((edit) => edit.path === path)));
        assert.ok(after.project(path).errors.length <= session.project(path).errors.length, said);
      }
    }
    for (const count of [renamed, refused, shown, disturbances]) assert.ok(texts < count, `${renamed} renamed, ${refused} refused, ${shown} forms, ${disturbances} disturbances`);
  });
});
