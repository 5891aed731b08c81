/** The colouring grammar and the language configuration say what the language says. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { fixedWords, keywordsOf } from '../../server/src/syntax/fits';
import { statementShapes } from '../../server/src/syntax/statements';
import { unitSpelt } from '../../server/src/units/spelling';
import { colouredLine, expressionsIn, type Grammar } from './textMate';

const read = (file: string): unknown => JSON.parse(readFileSync(path.join('syntaxes', file), 'utf8'));
const grammar = read('quietrun.tmLanguage.json') as Grammar;
const configuration = read('language-configuration.json') as { readonly wordPattern: { readonly pattern: string; readonly flags: string }; readonly indentationRules: Readonly<Record<string, string>> };

/** The words of a rule that is one list of alternatives. */
const wordsOf = (key: string) => /\(\?:([a-z|-]+)\)/.exec(grammar.repository[key]!.match!)![1]!.split('|').sort();
const sorted = (words: Iterable<string>) => [...words].sort();

describe('the words of the colouring grammar', () => {
  const statements = new Set(Object.values(statementShapes).flatMap((shapes) => shapes.map(({ keyword }) => keyword)));
  const declarations = keywordsOf('file');

  it('are the declarations of the language', () => assert.deepEqual(wordsOf('declarationWords'), sorted(declarations)));
  it('are its statements', () => assert.deepEqual(wordsOf('statementWords'), sorted([...statements].filter((word) => !declarations.includes(word)))));
  it('are all of its other words', () => assert.deepEqual(sorted([...wordsOf('otherWords'), ...wordsOf('constantWords')]), sorted([...fixedWords].filter((word) => !statements.has(word)))));
  it('come with names where the language says so', () => {
    for (const { match } of grammar.repository.named!.patterns!) for (const word of /\(([a-z|]+)\)/.exec(match!)![1]!.split('|')) assert.ok(fixedWords.has(word), word);
  });
});

describe('colouring', () => {
  const scopes = (line: string) => colouredLine(grammar, line).map(({ text, scope }) => `${text}: ${scope.replace('.quietrun', '')}`);
  const check = (title: string, line: string, ...expected: readonly string[]) => it(title, () => assert.deepEqual(scopes(line), expected));
  const declares = 'storage.type.declaration';
  const states = 'support.function.statement';

  check('a declaration and its name', 'net VALVE_PWM {', `net: ${declares}`, 'VALVE_PWM: entity.name.type', '{: punctuation.section.block');
  check('a name that looks like something else', 'net is is 10k', `net: ${declares}`, 'is: entity.name.type', 'is: keyword.other', '10k: entity.other.inherited-class');
  check('a quoted name', 'net "A ""B"" C" {', `net: ${declares}`, '"A ""B"" C": entity.name.type', '{: punctuation.section.block');
  check('a trace, its net and its width', '  trace 3V3 0.25mm reversed', `trace: ${states}`, '3V3: variable.other.net', '0.25: constant.numeric', 'mm: keyword.other.unit', 'reversed: constant.language');
  check('a trace of a loop, which has no net', '  trace 9 mm above GND', `trace: ${states}`, '9: constant.numeric', 'mm: keyword.other.unit', 'above: keyword.other', 'GND: entity.name.type.layer');
  check('a length after a word that takes a name elsewhere', 'trace A 1 mm after 12 mm', `trace: ${states}`, 'A: variable.other.net', '1: constant.numeric', 'mm: keyword.other.unit', 'after: keyword.other', '12: constant.numeric', 'mm: keyword.other.unit');
  check('a tolerance', 'gap 0.2mm±10 % # more', `gap: ${states}`, '0.2: constant.numeric', 'mm: keyword.other.unit', '±: keyword.operator.tolerance', '10: constant.numeric', '%: keyword.other.unit', '#: punctuation.definition.comment', '# more: comment.line.number-sign');
  check('letter codes', 'load 4k7, 2p2; swing 3V3', `load: ${states}`, '4k7: constant.numeric.code', ',: punctuation.separator', '2p2: constant.numeric.code', ';: punctuation.terminator', `swing: ${states}`, '3V3: constant.numeric.code');
  check('units of every kind', 'noise 5 nV/rtHz, 2 pA/rtHz', `noise: ${states}`, '5: constant.numeric', 'nV/rtHz: keyword.other.unit', ',: punctuation.separator', '2: constant.numeric', 'pA/rtHz: keyword.other.unit');
  check('a comment only where a word could begin', 'net RESET# { once }#x', `net: ${declares}`, 'RESET#: entity.name.type', '{: punctuation.section.block', `once: ${states}`, '}: punctuation.section.block', '#: punctuation.definition.comment', '#x: comment.line.number-sign');
  check('documentation', '## What it is', '##: punctuation.definition.comment', '## What it is: comment.line.documentation');
  check('three marks are a plain comment', '### x', '#: punctuation.definition.comment', '### x: comment.line.number-sign');
  check('a waiver', 'waive over-budget on A because "x ""y"" z"', `waive: ${declares}`, 'over-budget: entity.name.tag.rule', 'on: keyword.other', 'A: entity.name.type', 'because: keyword.other', '"x ""y"" z": string.quoted.double');
  check('a string that is not closed, to its line end', 'use "a # b', `use: ${declares}`, '"a # b: string.quoted.double');
  check('no unit in the wrong case', 'rise 40 NS', `rise: ${states}`, '40: constant.numeric');
  check('no word within a word', 'net trace-net gap', `net: ${declares}`, 'trace-net: entity.name.type', `gap: ${states}`);

  it('colours exactly the units that are read', () => {
    const symbols = ['V', 'A', 'ohm', 'Ω', '\u2126', 'R', 'F', 'H', 's', 'Hz', 'm', 'K', 'V/m', 'V/rtHz', 'A/rtHz', 'cm', 'mil', 'in', 'oz', 'degC', '°C', 'dB', '%', 'deg', '°', 'dBuV/m', 'dBµV/m', 'dBμV/m', 'mm2', 'cm2', 'm2', 'mm²', 'cm²', 'm²', 'ft', 'Ohm', 'hz', 'S', 'J'];
    for (const symbol of symbols) {
      for (const prefix of ['', ...'fpnuµμmkMGTcdh']) {
        const isColoured = colouredLine(grammar, `1 ${prefix}${symbol}`).some(({ scope, text }) => scope.startsWith('keyword.other.unit') && text === prefix + symbol);
        assert.equal(isColoured, unitSpelt(prefix + symbol) !== undefined, prefix + symbol);
      }
    }
  });

  it('takes time that grows with the line, for each expression', () => {
    const length = 20_000;
    const lines = ['0', '1.', '1e', 'net ', 'net "', 'trace "" ', '"', '""', ' ', '#', 'a', '+-', '±1', '1 mm ', '-', '[', 'net a is ', '\u00a0', 'on 1', 'on 1 ', 'µ'].map((unit) => unit.repeat(length / unit.length));
    for (const source of expressionsIn(grammar)) {
      for (const line of lines) {
        const expression = new RegExp(source, 'g');
        const start = performance.now();
        for (let match = expression.exec(line); match !== null; match = expression.exec(line)) if (match[0] === '') expression.lastIndex += 1;
        // Milliseconds where it is linear; a quadratic one takes seconds, an exponential one does not end.
        assert.ok(performance.now() - start < 1500, `${source} on ${line.slice(0, 12)}…`);
      }
    }
  });
});

describe('the language configuration', () => {
  it('takes for a word what the language does', () => {
    const pattern = new RegExp(`^(?:${configuration.wordPattern.pattern})$`, configuration.wordPattern.flags);
    for (const word of ['A', '3V3', 'D[0..7]', 'RESET#', 'over-budget', '0.2mm±10%', 'µ']) assert.match(word, pattern);
    for (const word of ['#A', 'A B', 'A;', '"A"', '{', 'A,B']) assert.doesNotMatch(word, pattern);
  });

  it('indents after an opening brace and back at a closing one', () => {
    const { increaseIndentPattern, decreaseIndentPattern } = configuration.indentationRules as { increaseIndentPattern: string; decreaseIndentPattern: string };
    assert.match('net A {', new RegExp(increaseIndentPattern));
    assert.match('net A {   # a comment', new RegExp(increaseIndentPattern));
    assert.doesNotMatch('net A { once }', new RegExp(increaseIndentPattern));
    assert.doesNotMatch('# net A {', new RegExp(increaseIndentPattern));
    assert.match('  }', new RegExp(decreaseIndentPattern));
  });
});
