/**
 * Each example says what its file beside this one says; `UPDATE=1` writes that anew, and the difference is
 * read. The numbers have three figures, so that they change with the physics and not with its last digit.
 */
import assert from 'node:assert/strict';
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { run } from '../../server/src/cli/run';
import { checkSchema, type CheckReport } from '../../server/src/cli/checkSchema';

/** Folders of whole boards; `common` holds what they share. */
const boards = readdirSync('examples', { recursive: true, encoding: 'utf8' })
  .map((file) => `examples/${file.split(path.sep).join('/')}`)
  .filter((file) => file.endsWith('.quiet') && !file.includes('/common/'))
  .sort();

async function check(board: string, format: 'text' | 'json') {
  let out = '';
  const never = async () => assert.fail('nothing here is read from elsewhere');
  const code = await run(['check', board, '--format', format], { workingDirectory: process.cwd(), version: '0.0.0', coloured: false, write: (text) => { out += text; }, complain: (text) => assert.fail(text), readStandardInput: never, serve: never });
  return { code, out };
}

async function reportOf(board: string): Promise<CheckReport> {
  return checkSchema.parse(JSON.parse((await check(board, 'json')).out));
}

describe('examples', () => {
  for (const board of boards) {
    it(`${board} says what is expected`, async () => {
      const { out } = await check(board, 'text');
      const expected = `test/examples/${path.basename(board, '.quiet')}.txt`;
      if (process.env['UPDATE'] === '1') writeFileSync(expected, out);
      assert.ok(existsSync(expected), `${expected} is missing: UPDATE=1 writes it`);
      assert.equal(out, readFileSync(expected, 'utf8'));
    });
  }

  it('show a board with findings, of realistic size, in more than one file', async () => {
    const { files: [file], summary } = await reportOf('examples/buoy/listening-post.quiet');
    assert.ok(0 < summary.errors && 0 < summary.waived);
    assert.ok(10 <= file.runs.length && 12 <= new Set(file.runs.flatMap((each) => each.conductors)).size && 2 <= file.uses.length);
    assert.ok(file.budgets.every((budget) => budget.complete));
  });

  it('show a board without', async () => {
    const { files: [file], summary } = await reportOf('examples/beacon/mooring-light.quiet');
    assert.deepEqual([summary.errors, summary.warnings, summary.information, summary.hints], [0, 0, 0, 0]);
    assert.ok(file.budgets.every((budget) => budget.verdict === 'pass'));
  });
});
