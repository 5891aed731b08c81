/** What newcomers copy from is formatted: the examples, the language's reference, the rules' pages, the first board. `UPDATE=1` sets the first two in order. */
import assert from 'node:assert/strict';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { starterBoard } from '../../client/src/starterBoard';
import { rules } from '../../server/src/rules/index';
import { formatted } from '../../server/src/syntax/format/formatEdits';

const examples = readdirSync('examples', { recursive: true, encoding: 'utf8' }).filter((file) => file.endsWith('.quiet')).map((file) => `examples/${file.split(path.sep).join('/')}`).sort();
const blocks = /(?<=^```quietrun\n)[\s\S]*?(?=^```$)/gm;

describe('what newcomers copy from is formatted:', () => {
  for (const file of [...examples, 'syntaxes/language.md']) {
    it(file, () => {
      const text = readFileSync(file, 'utf8');
      const wanted = file.endsWith('.md') ? text.replace(blocks, formatted) : formatted(text);
      if (process.env['UPDATE'] === '1') writeFileSync(file, wanted);
      else assert.equal(text, wanted);
    });
  }

  it('the first board', () => assert.equal(starterBoard, formatted(starterBoard)));

  for (const { name, documentation: { bad, good } } of rules) {
    it(`the example of ${name}`, () => {
      assert.equal(bad.trimEnd(), formatted(bad).trimEnd());
      assert.equal(good.trimEnd(), formatted(good).trimEnd());
    });
  }
});
