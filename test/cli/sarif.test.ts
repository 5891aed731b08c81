/** SARIF against the schema that OASIS published, and what a service would make of it. */
import assert from 'node:assert/strict';
import { readdirSync, readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import Ajv, { type ValidateFunction } from 'ajv';
import { readFixture } from '../support/fixture';
import { rootPath } from '../support/evaluated';
import { commandLine } from './commandLine';

const { put, quietrun, textOf } = commandLine();

const validate = schemaOf('test/reference/sarif-2.1.0.schema.json');

/** Draft 4 differs from what the validator reads in the name of its id only, as far as this schema goes. */
function schemaOf(file: string): ValidateFunction {
  const { $schema, id, ...schema } = JSON.parse(readFileSync(file, 'utf8'));
  assert.match($schema, /draft-04/);
  assert.match(id, /sarif-2\.1\.0/);
  return new Ajv({ strict: false, unicodeRegExp: false, validateFormats: true, formats: { uri: /^[a-z][a-z0-9+.-]*:[^\s]*$/i, 'uri-reference': /^(?:[\w\-.~:/?#[\]@!$&'()*+,;=]|%[0-9a-f]{2})*$/i, 'date-time': true } }).compile(schema);
}

async function sarif(...words: readonly string[]) {
  const { code, out, complaints } = await quietrun(['check', '--format', 'sarif', ...words]);
  assert.equal(complaints, '');
  const log = JSON.parse(out);
  const isValid: boolean = validate(log);
  assert.ok(isValid, JSON.stringify(validate.errors?.slice(0, 3)));
  return { code, run: log.runs[0], results: log.runs[0].results };
}

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const over = `${stackup}net CLK { swing 3.3 V; rise 1 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 1 kohm; load 1 Mohm, 20 pF; tolerates 10 mV peak }
run r on TOP for 30 mm { trace CLK 0.2 mm; gap 0.2 mm; trace SENSE 0.15 mm }
`;

describe('SARIF', () => {
  for (const file of readdirSync('test/rules').filter((each) => each.endsWith('.quiet'))) {
    it(`is valid of ${file}`, async () => {
      const { texts } = readFixture(readFileSync(`test/rules/${file}`, 'utf8'));
      for (const [path, text] of texts) put(path, text);
      const { results } = await sarif(rootPath);
      assert.ok(0 < results.length);
    });
  }

  it('is valid of a board without findings', async () => {
    put('clean.quiet', `${stackup}net A { source 1 kohm; load 1 kohm }\nrun r on TOP for 9 mm { trace A 0.2 mm }\n`);
    const { code, results } = await sarif('clean.quiet');
    assert.equal(code, 0);
    assert.deepEqual(results, []);
  });

  it('describes each rule, and gives each result its rule, level, place and key', async () => {
    put('over.quiet', over);
    const { code, run, results } = await sarif('over.quiet');
    assert.equal(code, 1);
    for (const { ruleId, ruleIndex } of results) assert.equal(run.tool.driver.rules[ruleIndex].id, ruleId);
    const result = results.find(({ ruleId }: { ruleId: string }) => ruleId === 'over-budget');
    assert.equal(result.level, 'error');
    assert.deepEqual(result.locations[0].physicalLocation, { artifactLocation: { uri: 'over.quiet', uriBaseId: 'WORKING_DIRECTORY' }, region: { startLine: 3, startColumn: 5, endLine: 3, endColumn: 10 } });
    assert.deepEqual(result.partialFingerprints, { 'quietrunKey/v1': 'over.quiet over-budget net SENSE peak' });
    assert.deepEqual(result.suppressions, []);
    assert.ok(10e-3 < result.properties.value && result.properties.limit === 10e-3);
  });

  it('keeps its fingerprint when the text moves', async () => {
    put('moved.quiet', over);
    const before = await sarif('moved.quiet');
    put('moved.quiet', `# moved\n\n${over.replace('gap 0.2 mm', 'gap   0.2 mm').replace('run r', '# as placed\nrun r')}`);
    const after = await sarif('moved.quiet');
    const prints = ({ results }: typeof before) => results.map(({ partialFingerprints }: { partialFingerprints: object }) => JSON.stringify(partialFingerprints)).sort();
    assert.deepEqual(prints(after), prints(before));
  });

  it('holds fixes that mend: applied by their regions, the finding is gone', async () => {
    put('mend.quiet', over.replaceAll('\n', '\r\n'));
    const { results } = await sarif('mend.quiet');
    const { fixes } = results.find(({ ruleId }: { ruleId: string }) => ruleId === 'over-budget');
    const widen = fixes.find(({ description }: { description: { text: string } }) => description.text.startsWith('Widen the gap'));
    assert.ok(widen, fixes.map(({ description }: { description: { text: string } }) => description.text).join(' | '));
    assert.ok(!fixes.some(({ description }: { description: { text: string } }) => description.text.startsWith('Waive')), 'a waiver needs a reason, which nobody has written');
    const [{ replacements }] = widen.artifactChanges;
    const lines = textOf('mend.quiet').split('\r\n');
    const at = (line: number, column: number) => lines.slice(0, line - 1).reduce((sum, each) => sum + each.length + 2, 0) + column - 1;
    let text = textOf('mend.quiet');
    for (const { deletedRegion: { startLine, startColumn, endLine, endColumn }, insertedContent } of replacements.toReversed()) text = text.slice(0, at(startLine, startColumn)) + insertedContent.text + text.slice(at(endLine, endColumn));
    put('mend.quiet', text);
    assert.equal((await sarif('mend.quiet')).code, 0);
  });

  it('says what is waived in the source, with the reason', async () => {
    put('waived.quiet', `${over}waive over-budget on SENSE because "as measured"\n`);
    const { code, results } = await sarif('waived.quiet');
    assert.equal(code, 0);
    assert.deepEqual(results.find(({ ruleId }: { ruleId: string }) => ruleId === 'over-budget').suppressions, [{ kind: 'inSource', justification: 'as measured' }]);
  });

  it('says what a baseline knows, as external', async () => {
    put('based.quiet', over);
    await quietrun(['check', 'based.quiet', '--update-baseline', 'base.json']);
    const { code, results } = await sarif('based.quiet', '--baseline', 'base.json');
    assert.equal(code, 0);
    assert.equal(results.find(({ ruleId }: { ruleId: string }) => ruleId === 'over-budget').suppressions[0].kind, 'external');
  });

  it('is valid whatever the names of files and nets hold', async () => {
    const name = 'a %23<b>&"é🔌.quiet';
    put(name, over.replaceAll('SENSE', '"S\u0001<&>\u202e"'));
    const { results } = await sarif(name);
    assert.ok(results.length > 0);
    assert.match(results[0].locations[0].physicalLocation.artifactLocation.uri, /^a%20%2523%3Cb%3E%26%22/);
  });
});
