/** Every fix against its fixture: what is offered, with which title, and the file that comes of it. */
import assert from 'node:assert/strict';
import { readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { createSolveCache, type SolveCache } from '../../server/src/budget/solveCache';
import { fixesFor } from '../../server/src/fixes/index';
import { rootPath, type Texts } from '../support/evaluated';
import { readFixture, renderFixture, type Fixture, type FixtureFix } from '../support/fixture';
import { fixing, withEdits } from '../support/fixing';

const folder = 'test/fixes';

describe('fixes against their fixtures', () => {
  for (const file of readdirSync(folder).filter((name) => name.endsWith('.quiet'))) {
    // Line ends change no number: what one test has solved the other finds.
    const cache = createSolveCache();
    it(file, () => {
      const expected = readFileSync(`${folder}/${file}`, 'utf8');
      const fixture = readFixture(expected);
      const { findings, fixes } = offered(fixture, fixture.texts, cache);
      const rendered = renderFixture(fixture, findings, fixes);
      if (process.env['UPDATE'] === '1') writeFileSync(`${folder}/${file}`, rendered);
      else assert.equal(rendered, expected);
    });

    it(`${file} with CRLF`, () => {
      const fixture = readFixture(readFileSync(`${folder}/${file}`, 'utf8'));
      const windows = new Map([...fixture.texts].map(([path, text]) => [path, text.replaceAll('\n', '\r\n')]));
      const asPlain = ({ after, ...fix }: FixtureFix) => ({ ...fix, after: new Map([...after].map(([path, text]) => [path, text.replaceAll('\r\n', '\n')])) });
      const { fixes } = offered(fixture, windows, cache);
      assert.deepEqual(fixes.map(asPlain), offered(fixture, fixture.texts, cache).fixes);
      for (const { after } of fixes) {
        for (const text of after.values()) assert.doesNotMatch(text, /[^\r]\n/, 'a line ends in another way than the others');
      }
    });
  }
});

function offered({ wantedFixes }: Fixture, texts: Texts, cache: SolveCache) {
  const { findings, context } = fixing(texts, cache);
  const fixes = wantedFixes.flatMap(({ rule, titles }) => findings
    .filter((finding) => finding.rule === rule)
    .flatMap((finding) => fixesFor(finding, context))
    .filter(({ title }) => titles.some((begin) => title.startsWith(begin)))
    .map(({ title, preferred, edits }): FixtureFix => ({ rule, title, preferred, after: changed(texts, withEdits(texts, edits)) })));
  return { findings, fixes };
}

/** The files that are no longer what they were, the root first. */
function changed(before: Texts, after: Texts): Texts {
  const files = [...after].filter(([path, text]) => text !== before.get(path));
  return new Map(files.sort(([a], [b]) => Number(b === rootPath) - Number(a === rootPath)));
}
