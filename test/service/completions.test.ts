/** What completion offers at a point: labels in their order, and what an offer replaces and writes. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { completions } from '../../server/src/service/completions';
import { declarationSnippets } from '../../server/src/service/declarationSnippets';
import { Session } from '../../server/src/service/session';
import { shapeOf } from '../../server/src/syntax/fits';
import type { BlockKind } from '../../server/src/syntax/grammar';
import { parse } from '../../server/src/syntax/parse';
import { statementShapes } from '../../server/src/syntax/statements';
import type { Span, Statement } from '../../server/src/syntax/tree';
import { validText } from '../syntax/validText';
import { atCursor } from './cursor';

const shared = `board b { clearance 0.1 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um; core 1 mm er 4; copper BOTTOM 35 um }
family gate { swing 12 V; rise 10 ns }
## What drives the valve.
net VALVE { swing 24 V; rise 40 ns; switches with GATES }
net "RX IN" { tolerates 2 mV peak }
pair AIN { plus VALVE; minus "RX IN" }
run alley on TOP for 10 mm { trace VALVE 0.2 mm; gap 0.2 mm; guard GND 0.2 mm; gap 0.2 mm; trace "RX IN" 0.2 mm }
loop big on TOP { carries VALVE; circle 9 mm }
return r { measured 1 ohm }
`;

/** `text` is put behind a board that declares one thing of each kind, in a file of its own. */
function offers(title: string, text: string, ...expected: readonly string[]): void {
  atCursor(title, { 'shared.quiet': shared, 'a.quiet': `use "shared.quiet"\n${text}` }, ({ session, path, offset }) => assert.deepEqual(completions(session, path, offset).map(({ label }) => label), expected));
}

const keywords = (kind: keyof typeof statementShapes) => [...statementShapes[kind].map(({ keyword }) => keyword), ...(kind === 'file' ? declarationSnippets.map(({ prefix }) => prefix) : [])];

describe('completion where a statement may begin', () => {
  offers('declarations at the start of a line', '<|>', ...keywords('file'));
  offers('while the word is being written', 'ne<|>', ...keywords('file'));
  offers('after a declaration', 'net A { once }\n<|>\nnet B { once }', ...keywords('file'));
  offers('after a declaration on the same line', 'net A { once } <|>', ...keywords('file'));
  offers('properties of a net', 'net A {\n  <|>\n}', ...keywords('net'));
  offers('without those that are stated, which may stand once', 'net A { swing 3 V; tolerates 1 mV peak; <|> }', ...keywords('net').filter((keyword) => keyword !== 'swing'));
  offers('but with the one that is being written', 'net A { swing 3 V; ri<|>se 4 ns }', ...keywords('net').filter((keyword) => keyword !== 'swing'));
  offers('rows of a run', 'run r for 1 mm {\n  on TOP {\n    <|>\n  }\n}', ...keywords('row'));
  offers('statements of a run', 'run r for 1 mm { on TOP { gap 1 mm }\n<|> }', ...keywords('run'));
  offers('layers of a stackup', 'stackup flex { <|> }', ...keywords('stackup'));
  offers('in a block that is not closed', 'net A {\n  swing 3 V\n  <|>', ...keywords('net').filter((keyword) => keyword !== 'swing'));
  offers('below lines that are broken', 'net A {\n  swing three\n  foo bar {\n }\n  rise 40\n  <|>\n}', ...keywords('net').filter((keyword) => !['swing', 'rise'].includes(keyword)));
  offers('a line below stray text', 'this is no declaration\n<|>', ...keywords('file'));

  it('the version, at the very start of a file', () => {
    const session = new Session();
    session.setText('a.quiet', '# a comment\n\nnet A is x\n');
    const [first] = completions(session, 'a.quiet', 13);
    assert.equal(first?.newText, 'quietrun 1');
  });
});

describe('completion of words', () => {
  offers('that a statement needs', 'net A { both <|> }', 'ways');
  offers('that a statement may have', 'net A <|>', 'is');
  offers('of several', 'board c { combine <|> }', 'worst', 'rss');
  offers('after a quantity', 'net A { tolerates 2 mV <|> }', 'peak', 'rms');
  offers('instead of a quantity', 'net A { tolerates <|> }', 'none');
  offers('that begin an optional part or its alternatives', 'net A { current 1 A <|> }', 'rise', 'rms', 'peak');
  offers('suffixes', 'run r on TOP for 1 mm { trace VALVE 0.2 mm <|> }', 'reversed', 'after', 'spaced');
  offers('suffixes that are left', 'run r on TOP for 1 mm { trace VALVE 0.2 mm after 1 mm r<|> }', 'reversed', 'spaced');
  offers('of the head of a run', 'run r <|>', 'on', 'for');
  offers('of the head of a run that are left', 'run r for 10 mm <|>', 'on');
  offers('of a mask', 'stackup s { mask 25 um flat <|> }', 'er', 'loss');
  offers('materials', 'shield s { sheet <|> }', 'copper', 'aluminium', 'brass', 'tin', 'steel', 'nickel-silver');
  offers('of the emission limit', 'board c { emits at most 40 dBuV/m <|> }', 'at');
  offers('axes', 'loop l { turned 90 deg about <|> }', 'x', 'y', 'z');
  offers('nothing after a statement that is complete', 'net A { rise 40 ns <|> }');
  offers('nothing where it is no longer clear what is due', 'net A { swing 3 V peak <|> }');
});

describe('completion of names', () => {
  offers('signal layers', 'run r on <|>', 'TOP', 'BOTTOM');
  offers('signal layers in a block', 'run r for 1 mm { on T<|> { } }', 'TOP', 'BOTTOM');
  offers('planes', 'loop l { over <|> }', 'GND1');
  offers('nets of a trace', 'run r on TOP for 1 mm { trace <|> }', 'VALVE', 'RX IN');
  offers('nets, and not the word that is being written', 'run r on TOP for 1 mm { trace VAL<|> 0.2 mm }', 'VALVE', 'RX IN');
  offers('nets and pairs that a loop may sense', 'loop l { senses <|> }', 'VALVE', 'RX IN', 'AIN');
  offers('what a shield may cover', 'shield s { covers <|> }', 'VALVE', 'RX IN', 'AIN', 'big');
  offers('families of nets, built in and own', 'net A is <|>', 'gate', 'lvcmos33', 'lvcmos25', 'lvcmos18', 'ttl');
  offers('families of pairs', 'pair P is <|>', 'gate', 'lvds', 'rs485', 'can');
  offers('groups', 'net A { samples 1 us after <|> }', 'GATES');
  offers('guards', 'run r on TOP for 1 mm { guard <|> }', 'GND');
  offers('subjects of a waiver', 'waive over-budget on <|>', 'VALVE', 'RX IN', 'AIN', 'big', 'alley', 'r', 'gate', 'b');
  offers('none for what is being declared', 'net <|>');

  atCursor('quoted where that is due, with what is known of them', { 'a.quiet': `${shared}link l { between <|> }` }, ({ session, path, offset }) => {
    const [valve, rx] = completions(session, path, offset);
    assert.deepEqual([valve?.newText, valve?.detail, valve?.documentation], ['VALVE', 'net', 'What drives the valve.']);
    assert.equal(rx?.newText, '"RX IN"');
  });
});

describe('completion of units', () => {
  offers('after a number', 'net A { rise 40 <|> }', 'ns', 'us', 'ps', 's');
  offers('while the unit is being written', 'net A { rise 40 n<|> }', 'ns', 'us', 'ps', 's');
  offers('of either kind where either fits', 'net A { load 10 <|> }', 'ohm', 'kohm', 'Mohm', 'mohm', 'pF', 'nF', 'uF');
  offers('after a comma', 'net A { load 10 kohm, 470 <|> }', 'pF', 'nF', 'uF');
  offers('after a comma and a line end', 'net A { load 10 kohm,\n 470 <|> }', 'pF', 'nF', 'uF');
  offers('weights of copper', 'stackup s { copper A 1 <|> }', 'mm', 'um', 'mil', 'cm', 'in', 'm', 'oz');
  offers('in a point', 'loop l { path (1 mm, 2 <|>) }', 'mm', 'um', 'mil', 'cm', 'in', 'm');
  offers('of an optional quantity', 'loop l { carries VALVE 2 <|> }', 'A', 'mA', 'uA');
  offers('none after a plain number', 'stackup s { core 1 mm er 4<|> }');

  const replaced = (title: string, text: string, from: string, to: string) => atCursor(title, { 'a.quiet': text }, ({ session, path, offset }) => {
    const unit = completions(session, path, offset).find(({ label }) => label === 'ns')!;
    assert.deepEqual([session.text(path)!.slice(unit.span.start, unit.span.end), unit.newText], [from, to]);
  });
  replaced('which replace what is written of them', 'net A { rise 40 n<|>anos }', 'nanos', 'ns');
  replaced('which stand apart from the number', 'net A { rise 40n<|> }', 'n', ' ns');
  replaced('directly behind the number', 'net A { rise 40<|> }', '', ' ns');
});

describe('completion elsewhere', () => {
  offers('nothing in a comment', 'net A { once } # n<|>');
  offers('nothing at the end of a comment', '# net<|>\nnet A { once }');
  offers('nothing in documentation', '## n<|>\nnet A { once }');
  offers('nothing in a string', 'waive over-budget on VALVE because "o<|>"');
  offers('nothing in a string that is not closed', 'waive over-budget on VALVE because "on <|>');
  offers('nothing while a number is being written where no unit follows', 'return q { via 3<|> }');

  atCursor('rules after waive, those that can be waived', { 'a.quiet': 'net A { waive <|> }' }, ({ session, path, offset }) => {
    const labels = completions(session, path, offset).map(({ label }) => label);
    assert.ok(labels.includes('over-budget') && labels.includes('gap-below-clearance'));
    assert.ok(!labels.includes('syntax') && !labels.includes('unused-waiver'));
  });
});

describe('completion and the parser', () => {
  it('offers what the parser reads: each keyword and word of a valid text, at its place', () => {
    fc.assert(fc.property(validText({ oddNames: false, separators: ['\n', ' ; '] }), fc.nat(), (text, choice) => {
      const places = placesOf(parse(text).statements, 'file');
      if (places.length === 0) return;
      const { span, word } = places[choice % places.length]!;
      const session = new Session();
      session.setText('a.quiet', text);
      const offered = completions(session, 'a.quiet', span.start + 1).map(({ label }) => label);
      assert.ok(offered.includes(word), `${word} among ${offered.join(', ')}`);
    }), { seed: 3, numRuns: 600 });
  });

  it('never throws, wherever it is asked', () => {
    fc.assert(fc.property(validText({ oddNames: true, separators: ['\n', ' ; '] }), fc.nat(), fc.nat(12), (text, at, length) => {
      const start = at % (text.length + 1);
      const session = new Session();
      session.setText('a.quiet', text.slice(0, start) + text.slice(start + length));
      for (const { span } of completions(session, 'a.quiet', start)) assert.ok(span.start <= start && start <= span.end);
    }), { seed: 4, numRuns: 400 });
  });
});

/** Keywords and fixed words, but for what may stand once in its block and was written twice. */
function placesOf(statements: readonly Statement[], kind: BlockKind): readonly { readonly span: Span; readonly word: string }[] {
  return statements.flatMap((statement) => {
    const { keyword, keywordSpan, values, block } = statement;
    const isTooMuch = !shapeOf(kind, keyword)!.repeats && 1 < statements.filter((other) => other.keyword === keyword).length;
    const words = values.flatMap((value) => (value.kind === 'word' && value.role !== 'rule' ? [{ span: value.span, word: value.word }] : []));
    return [...(isTooMuch ? [] : [{ span: keywordSpan, word: keyword }]), ...words, ...(block === null ? [] : placesOf(block.statements, block.kind))];
  });
}
