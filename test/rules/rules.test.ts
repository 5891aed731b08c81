/** Every rule against its fixture and the examples of its own page. */
import assert from 'node:assert/strict';
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { rules } from '../../server/src/rules/index';
import { evaluated, rootPath, type Texts } from '../support/evaluated';
import { readFixture, renderFixture } from '../support/fixture';

const folder = 'test/rules';
const fixtures = readdirSync(folder).filter((file) => file.endsWith('.quiet'));

describe('rules against their fixtures', () => {
  for (const file of fixtures) {
    it(file, () => {
      const expected = readFileSync(`${folder}/${file}`, 'utf8');
      const fixture = readFixture(expected);
      const { findings } = evaluated(fixture.texts);
      const rendered = renderFixture(fixture, findings);
      if (process.env['UPDATE'] === '1') writeFileSync(`${folder}/${file}`, rendered);
      else assert.equal(rendered, expected);
      const rule = file.replace('.quiet', '');
      assert.ok(findings.some((finding) => finding.rule === rule), `${file} has no finding of ${rule}`);
    });

    it(`${file} with CRLF`, () => {
      const { texts } = readFixture(readFileSync(`${folder}/${file}`, 'utf8'));
      const plain = evaluated(texts).findings.map(withLine(texts));
      const windows: Texts = new Map([...texts].map(([path, text]) => [path, text.replaceAll('\n', '\r\n')]));
      assert.deepEqual(evaluated(windows).findings.map(withLine(windows)), plain);
    });
  }

  for (const { name } of rules) {
    it(`${name} has a fixture`, () => assert.ok(existsSync(`${folder}/${name}.quiet`)));
  }
});

describe('the examples of every rule’s page', () => {
  // What an `include` example may use.
  const library = ['common/four-layer.quiet', 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n'] as const;
  for (const { name, documentation: { bad, good, finds, matters } } of rules) {
    it(`${name}: bad has it, good has none`, () => {
      const found = (text: string) => evaluated(new Map([[rootPath, text], library])).findings.filter(({ waived }) => waived === null);
      assert.ok(found(bad).some(({ rule }) => rule === name), found(bad).map(({ rule, message }) => `${rule}: ${message}`).join('\n'));
      assert.deepEqual(found(good).map(({ rule, message }) => `${rule}: ${message}`), []);
    });

    it(`${name}: says what and why in sentences`, () => {
      for (const part of [finds, matters]) assert.match(part, /^[A-Z0-9].*[.?]$/s);
    });
  }
});

function withLine(texts: Texts) {
  return ({ at, rule, message, severity }: { at: { path: string; span: { start: number; end: number } }; rule: string; message: string; severity: string }) => {
    const before = (offset: number) => texts.get(at.path)!.slice(0, offset).split(/\r?\n/);
    const [start, end] = [before(at.span.start), before(at.span.end)];
    return { path: at.path, rule, message, severity, start: [start.length, start.at(-1)!.length], end: [end.length, end.at(-1)!.length] };
  };
}
