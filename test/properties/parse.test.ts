/** Properties of reading a text, over generated and over arbitrary texts. Seeds are fixed, so a failure repeats. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { isSpace } from '../../server/src/syntax/characters';
import { parse } from '../../server/src/syntax/parse';
import type { SourceTree, Span, Statement } from '../../server/src/syntax/tree';
import { treeText } from '../syntax/treeText';
import { validText } from '../syntax/validText';

const run = (numRuns: number) => ({ seed: 2, numRuns });
const separators = ['\n', ' ; ', '\n\n  # a comment\n', ';\n'];
const anyText = fc.string({ unit: fc.oneof(fc.constantFrom(...'{}();,"# \n\t\r.±-0123456789[]', ' net ', ' run ', '\nnet ', ' return ', ' on ', ' for ', ' trace ', ' gap ', ' 0.2 mm ', ' mm ', '\u201c', '\u00d7', '\ufeff'), fc.string({ unit: 'binary', maxLength: 2 })), maxLength: 120 });

describe('reading a valid text', () => {
  it('finds nothing wrong, whatever the names look like', () => {
    fc.assert(fc.property(validText({ oddNames: true, separators }), (text) => {
      const tree = parse(text);
      assert.deepEqual(tree.errors, []);
      assert.deepEqual(tree.unread, []);
      for (const statement of everyStatement(tree.statements)) assert.equal(statement.broken, false);
    }), run(800));
  });

  it('is not led astray further than two errors by a token that is left out', () => {
    fc.assert(fc.property(validText({ oddNames: false, separators }), fc.nat(), (text, choice) => {
      const tokens = parse(text).tokens.filter((token) => token.kind !== 'comment');
      if (tokens.length === 0) return;
      const { start, end } = tokens[choice % tokens.length]!;
      const { errors } = parse(text.slice(0, start) + text.slice(end));
      assert.ok(errors.length <= 2, errors.map(({ message }) => message).join('\n'));
    }), run(3000));
  });

  it('reads CRLF as LF', () => {
    fc.assert(fc.property(validText({ oddNames: true, separators }), (text) => {
      assert.equal(treeText(parse(text.replaceAll('\n', '\r\n'))), treeText(parse(text)));
    }), run(200));
  });
});

describe('reading any text', () => {
  it('never throws, and places everything within the text and in order', () => {
    fc.assert(fc.property(anyText, (text) => checkTree(parse(text))), run(3000));
  });

  it('never throws on a valid text with a stretch put in its place', () => {
    fc.assert(fc.property(validText({ oddNames: true, separators }), anyText, fc.nat(), fc.nat(20), (text, stretch, at, length) => {
      const start = at % (text.length + 1);
      checkTree(parse(text.slice(0, start) + stretch + text.slice(start + length)));
    }), run(1500));
  });

  it('covers every character by a token or a gap of white space', () => {
    fc.assert(fc.property(anyText, (text) => {
      let at = 0;
      for (const { start, end } of [...parse(text).tokens, { start: text.length, end: text.length + 1 }]) {
        for (; at < start; at += 1) assert.ok(isSpace(text.charCodeAt(at)), `a gap that holds ${JSON.stringify(text[at])}`);
        assert.ok(start < end);
        at = end;
      }
    }), run(1000));
  });

  it('depends on the text alone', () => {
    fc.assert(fc.property(anyText, anyText, (text, other) => {
      const before = JSON.stringify(parse(text));
      parse(other);
      assert.equal(JSON.stringify(parse(text)), before);
    }), run(500));
  });

  it('finds the same in CRLF as in LF', () => {
    fc.assert(fc.property(anyText, (raw) => {
      const text = raw.replaceAll('\r', '');
      const errors = (tree: SourceTree) => tree.errors.map(({ rule, message }) => `${rule} ${message}`.replaceAll('\r\n', '\n'));
      assert.deepEqual(errors(parse(text.replaceAll('\n', '\r\n'))), errors(parse(text)));
    }), run(1000));
  });

  it('reports corrections that can be carried out', () => {
    fc.assert(fc.property(validText({ oddNames: false, separators }), fc.nat(), fc.constantFrom('\u2013', ',5', ' x ', '\u201c', 'Q', '.'), (text, at, slip) => {
      const start = at % (text.length + 1);
      const spoilt = text.slice(0, start) + slip + text.slice(start);
      for (const { span, newText } of parse(spoilt).errors.flatMap(({ corrections }) => corrections)) assert.notEqual(spoilt.slice(span.start, span.end), newText);
    }), run(500));
  });
});

function checkTree(tree: SourceTree): void {
  const within = ({ start, end }: Span) => assert.ok(0 <= start && start <= end && end <= tree.text.length, `${start}..${end}`);
  for (const error of tree.errors) {
    within(error.span);
    error.corrections.forEach(({ span }) => within(span));
    assert.ok(error.message.length < 400);
  }
  tree.unread.forEach(within);
  let last = 0;
  for (const statement of tree.statements) {
    assert.ok(last <= statement.span.start);
    last = statement.span.end;
    checkStatement(statement, within);
  }
}

function checkStatement(statement: Statement, within: (span: Span) => void): void {
  within(statement.span);
  const inside = ({ start, end }: Span) => assert.ok(statement.span.start <= start && start <= end && end <= statement.span.end);
  inside(statement.keywordSpan);
  for (const value of statement.values) {
    inside(value.span);
    if (value.kind === 'quantity') [value.numberSpan, value.unitSpan].forEach(inside);
    if (value.kind === 'quantity' && Number.isNaN(value.value)) assert.ok(statement.broken);
  }
  if (statement.block === null) return;
  inside(statement.block.span);
  for (const each of statement.block.statements) {
    inside(each.span);
    checkStatement(each, within);
  }
}

function everyStatement(statements: readonly Statement[]): readonly Statement[] {
  return statements.flatMap((statement) => [statement, ...everyStatement(statement.block?.statements ?? [])]);
}
