/** One mistake gives at most two findings, and never one of the names that it hides. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { parse } from '../../server/src/syntax/parse';
import { everything } from './everything';
import { found, resolved } from './resolved';

const { tokens } = parse(everything);

describe('a board with every statement', () => {
  it('has nothing wrong with it', () => {
    assert.deepEqual(found(everything), []);
    assert.equal(resolved(everything).complete, true);
  });
});

type Change = (before: string, token: string, after: string) => string;

/** What the resolver adds to the parser's findings: never more than makes two, and nothing once these are two. */
function checkEach(change: Change, most: (ofText: number) => number, every = 1): void {
  const cascades: string[] = [];
  for (const [index, { kind, start, end }] of tokens.entries()) {
    if (kind === 'comment' || index % every !== 0) continue;
    const text = change(everything.slice(0, start), everything.slice(start, end), everything.slice(end));
    const findings = found(text);
    if (most(parse(text).errors.length) < findings.length) cascades.push(`${JSON.stringify(everything.slice(start, end))} in line ${everything.slice(0, start).split('\n').length}:\n  ${findings.join('\n  ')}`);
  }
  assert.deepEqual(cascades, []);
}

describe('findings do not cascade', () => {
  it('from a token deleted: two at most', () => checkEach((before, _, after) => before + after, () => 2));
  it('from a stray word before every third token: the parser\'s own, or two', () => checkEach((before, token, after) => `${before}@@ ${token}${after}`, (ofText) => Math.max(2, ofText), 3));
  it('from every third token written twice: the parser\'s own, or two', () => checkEach((before, token, after) => `${before}${token} ${token}${after}`, (ofText) => Math.max(2, ofText), 3));
});
