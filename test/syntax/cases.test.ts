/**
 * Text cases of the grammar: `=== title`, the input, `==>`, the tree and the errors that it makes.
 * `UPDATE=1` rewrites what stands after the arrows; the difference is to be read.
 */
import assert from 'node:assert/strict';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { parse } from '../../server/src/syntax/parse';
import { treeText } from './treeText';

const folder = path.join('test', 'syntax', 'cases');

for (const file of readdirSync(folder).filter((name) => name.endsWith('.txt'))) {
  describe(`cases of ${file}`, () => {
    const full = path.join(folder, file);
    const cases = readFileSync(full, 'utf8').split(/^(?==== )/m).map(readCase);
    for (const { title, input, tree } of cases) it(title, () => assert.equal(process.env.UPDATE === '1' ? tree : treeText(parse(input)), tree));
    if (process.env.UPDATE === '1') writeFileSync(full, cases.map(({ title, input }) => `=== ${title}\n${input}\n==>\n${treeText(parse(input))}\n`).join('\n'));
  });
}

function readCase(text: string): { readonly title: string; readonly input: string; readonly tree: string } {
  const [head, ...rest] = text.split('\n');
  const arrow = rest.indexOf('==>');
  assert.ok(0 <= arrow, `a case without an arrow: ${head}`);
  return { title: head!.slice(4), input: rest.slice(0, arrow).join('\n'), tree: rest.slice(arrow + 1).join('\n').trimEnd() };
}
