/** What is said of keywords, fixed words and units where the cursor is on one. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { keywordDocumentation, statementMarkdown, unitMarkdown, wordMarkdown } from '../../server/src/service/keywordDocumentation';
import { wordMeanings } from '../../server/src/service/wordMeanings';
import { fixedWords } from '../../server/src/syntax/fits';
import { formOf } from '../../server/src/syntax/forms';
import { statementShapes } from '../../server/src/syntax/statements';
import { atCursor } from './cursor';
import type { Part } from '../../server/src/syntax/grammar';
import { unitSpelt } from '../../server/src/units/spelling';

/** What the answer covers, and its beginning. */
function check(title: string, text: string, covered: string | null, beginning = ''): void {
  atCursor(title, { 'a.quiet': text }, ({ session, path, offset }) => {
    const tree = session.tree(path)!;
    const answer = keywordDocumentation(tree, offset);
    assert.equal(answer === null ? null : tree.text.slice(answer.span.start, answer.span.end), covered);
    assert.equal(answer?.markdown.slice(0, beginning.length) ?? '', beginning);
  });
}

describe('documentation at a point', () => {
  check('of a declaration', 'ne<|>t A { once }', 'net', 'A net: a source of noise, a receiver, or both.');
  check('of a property', 'net A { s<|>wing 3 V }', 'swing', 'What the unloaded driver moves through');
  check('at the end of its word', 'net A { swing<|> 3 V }', 'swing', 'What the unloaded driver');
  check('of the same word in another block', 'return r { str<|>ip 30 mm by 1 mm on TOP }', 'strip', 'A flat piece of copper');
  check('of a fixed word', 'run r on TOP for 1 mm { trace A 1 mm rev<|>ersed }', 'reversed', 'This net’s receiving end');
  check('of a fixed word with a meaning of its own here', 'net A { samples 1 us af<|>ter G }', 'after', 'The group of which the edge has passed');
  check('of a word that only joins', 'net A { band 1 Hz t<|>o 2 Hz }', 'to', '```quietrun\nband FREQUENCY to FREQUENCY\n```');
  check('of a unit', 'net A { rise 40 n<|>s }', 'ns', '`ns` measures a time: 1 ns is 10⁻⁹ s.');
  check('of a unit in a point', 'loop l { circle 1 mm at (1 mm, 2 mi<|>l) }', 'mil', '`mil` measures a length: 1 mil is 25.4 µm.');
  check('of copper by weight', 'stackup { copper A 1 o<|>z }', 'oz', '`oz` measures a length: 1 oz is 35 µm.');
  check('not of a name, whatever it is spelt like', 'net i<|>s is gate', null);
  check('not of a number', 'net A { rise 4<|>0 ns }', null);
  check('not of a comment', 'net A { once } # sw<|>ing', null);
  check('of a keyword in a block that is not closed', 'net A { onc<|>e', 'once', 'The edge does not repeat.');
});

describe('documentation', () => {
  it('is there for every statement, with its form', () => {
    for (const shape of Object.values(statementShapes).flat()) {
      assert.match(shape.about, /^[A-Z].*\.$/u, shape.keyword);
      assert.ok(statementMarkdown(shape).includes(formOf(shape)));
    }
  });

  it('gives examples as large as such a value is', () => {
    const of = (kind: keyof typeof statementShapes, keyword: string) => statementMarkdown(statementShapes[kind].find((shape) => shape.keyword === keyword)!);
    assert.match(of('net', 'tolerates'), /a voltage: .*such as `2 mV`/);
    assert.match(of('net', 'swing'), /a voltage: .*such as `3\.3 V`/);
    assert.match(of('link', 'capacitance'), /such as `0\.8 pF`/);
    for (const [kind, shapes] of Object.entries(statementShapes)) {
      for (const shape of shapes) for (const { role, dimension, example } of shape.parts.flatMap(quantitiesIn)) {
        const [, number, unit] = /^(-?\d+(?:\.\d+)?)(?: (\S+))?$/.exec(example) ?? [];
        assert.ok(number !== undefined && (unit === undefined ? 'number' : unitSpelt(unit)?.dimension) === dimension, `${kind} ${shape.keyword} ${role}: ${example}`);
      }
    }
  });

  it('says of every word that is no mere joint what it means', () => {
    const statements = new Set(Object.values(statementShapes).flatMap((shapes) => shapes.map(({ keyword }) => keyword)));
    const joints = ['to', 'from', 'at', 'and', 'above'];
    const materials = ['aluminium', 'brass', 'tin', 'steel', 'nickel-silver'];
    for (const word of fixedWords) if (!statements.has(word) && !joints.includes(word) && !materials.includes(word)) assert.ok(wordMeanings.has(word), word);
    for (const key of wordMeanings.keys()) for (const word of key.split(' ')) assert.ok(fixedWords.has(word), key);
  });

  it('says what one of a unit is', () => {
    assert.equal(unitMarkdown('kohm'), '`kohm` measures a resistance: 1 kohm is 10³ Ω.');
    assert.equal(unitMarkdown('degC'), '`degC` measures a temperature: 0 degC is 273.15 K.');
    assert.equal(unitMarkdown('mm2'), '`mm2` measures an area: 1 mm2 is 10⁻⁶ m².');
    assert.equal(unitMarkdown('V'), '`V` measures a voltage.');
    assert.equal(unitMarkdown('dB'), '`dB` measures a level, in decibels.');
    assert.equal(unitMarkdown('%'), '`%` measures a percentage: hundredths.');
    assert.equal(unitMarkdown('MHZ'), null);
    assert.equal(wordMarkdown('and', statementShapes.link[0]!), '```quietrun\nbetween NET and NET\n```');
  });
});

function quantitiesIn(part: Part): readonly (Part & { readonly is: 'quantity' })[] {
  switch (part.is) {
    case 'quantity': return [part];
    case 'optional':
    case 'repeat': return part.parts.flatMap(quantitiesIn);
    case 'choice':
    case 'suffixes': return part.of.flatMap((parts) => parts.flatMap(quantitiesIn));
    default: return [];
  }
}
