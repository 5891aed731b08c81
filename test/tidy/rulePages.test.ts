/** The reference in `syntaxes/rules.md` is what the rules say today: `UPDATE=1` writes it. */
import assert from 'node:assert/strict';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { rules } from '../../server/src/rules/index';
import { ruleNames } from '../../server/src/rules/ruleNames';
import { ruleReference } from '../../server/src/rules/rulePage';

const page = 'syntaxes/rules.md';

describe('the rule pages', () => {
  it('are current', () => {
    const wanted = ruleReference(rules);
    if (process.env['UPDATE'] === '1') writeFileSync(page, wanted);
    else assert.equal(existsSync(page) ? readFileSync(page, 'utf8') : '', wanted, `${page} is stale: run the tests with UPDATE=1`);
  });

  it('cover every rule name', () => {
    assert.deepEqual(rules.map(({ name }) => name).sort(), [...ruleNames].sort());
  });

  it('name models that exist', () => {
    for (const { name, documentation } of rules) {
      for (const model of documentation.models) assert.ok(existsSync(`server/src/physics/${model}.ts`), `${name} rests on physics/${model}, which is not there`);
    }
  });
});
