/**
 * Formatting changes white space and nothing else, whatever the text. `DOCUMENTS=10000` tries that many of each kind; a few hundred
 * otherwise. Seeds are fixed, so a failure repeats.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { checkReport } from '../../server/src/cli/checkReport';
import { Session } from '../../server/src/service/session';
import { isNewline, isSpace } from '../../server/src/syntax/characters';
import { formatted } from '../../server/src/syntax/format/formatEdits';
import { parse } from '../../server/src/syntax/parse';
import type { QuantityValue, Statement } from '../../server/src/syntax/tree';
import { everyKindOfBoard } from '../support/everyKindOfBoard';
import { generatedBoard, seeded, type Random } from '../support/generatedBoard';
import { treeText } from '../syntax/treeText';
import { validText } from '../syntax/validText';

const documents = Number(process.env['DOCUMENTS'] ?? 300);
const run = (numRuns: number) => ({ seed: 7, numRuns });
const separators = ['\n', ' ; ', ';', '\n\n  # a comment\n', ';\n', '  # behind\n', '\n## said\n', '\n\n\n\t', '\r\n'];
const text = validText({ oddNames: true, separators });
const anyText = fc.string({ unit: fc.oneof(fc.constantFrom(...'{}();,"# \n\t\r.±-0123456789[]', ' net ', ' run ', '\nnet ', ' return ', ' on ', ' for ', ' trace ', ' gap ', ' 0.2 mm ', '8mil', ' mm ', '\u201c', '\u00d7', '\ufeff', ' # said\n', '🔌'), fc.string({ unit: 'binary', maxLength: 2 })), maxLength: 160 });

describe('formatting a text', () => {
  it('that is valid keeps what it means, says and numbers, and is done at once', () => {
    fc.assert(fc.property(text, fc.nat(), (valid, seed) => {
      const messy = respaced(valid, seeded(seed));
      assert.equal(treeText(parse(messy)), treeText(parse(valid)));
      checkFormatted(messy);
    }), run(documents));
  });

  it('comes to the same from whatever white space', () => {
    fc.assert(fc.property(text, fc.nat(), (valid, seed) => {
      assert.equal(formatted(respaced(valid, seeded(seed))), formatted(valid));
    }), run(documents));
  });

  it('of which a token was left out keeps all the rest', () => {
    fc.assert(fc.property(text, fc.nat(), fc.nat(), (valid, choice, seed) => {
      const { tokens } = parse(valid);
      if (tokens.length === 0) return;
      const { start, end } = tokens[choice % tokens.length]!;
      checkFormatted(respaced(valid.slice(0, start) + valid.slice(end), seeded(seed)));
    }), run(documents));
  });

  it('in which a stretch was put in another’s place never throws and loses nothing', () => {
    fc.assert(fc.property(text, anyText, fc.nat(), fc.nat(20), (valid, stretch, at, length) => {
      const start = at % (valid.length + 1);
      checkFormatted(valid.slice(0, start) + stretch + valid.slice(start + length));
    }), run(documents));
  });

  it('that is none never throws and loses nothing', () => {
    fc.assert(fc.property(anyText, (none) => checkFormatted(none)), run(documents));
  });

  it('of bytes that are no text never throws and loses nothing', () => {
    fc.assert(fc.property(fc.uint8Array({ maxLength: 400 }), (bytes) => checkFormatted(new TextDecoder('utf-8', { ignoreBOM: true }).decode(bytes))), run(documents));
  });
});

describe('formatting a board', () => {
  it('leaves everything that is computed as it is, to the last bit', () => {
    for (let seed = 1; seed <= documents / 20; seed += 1) {
      const random = seeded(seed);
      const plain = seed % 2 === 0 ? generatedBoard(seed) : everyKindOfBoard(seed).join('\n');
      const board = respaced(seed % 3 === 0 ? plain : plain.replaceAll('; ', () => random.pick(['; ', '\n', ';', ' # so\n'])), random);
      checkFormatted(board);
      assert.equal(report(formatted(board)), report(board), `seed ${seed}:\n${board}`);
    }
  });
});

/** What holds for every text. */
function checkFormatted(before: string): void {
  const after = formatted(before);
  assert.equal(withoutSpaces(after), withoutSpaces(before));
  assert.deepEqual(comments(after), comments(before));
  assert.deepEqual(lineEnds(after).slice(0, lineEnds(before).length), lineEnds(before));
  assert.ok(lineEnds(after).length <= lineEnds(before).length + 1);
  assert.equal(treeText(parse(after)), treeText(parse(before)));
  assert.equal(formatted(after), after);
  const [old, now] = [linesIn(before), linesIn(after)];
  for (const line of linesWithErrors(before)) assert.equal(now[line], old[line], `line ${line} has an error`);
}

const withoutSpaces = (of: string) => [...of].filter((character) => !isSpace(character.charCodeAt(0)) && !isNewline(character.charCodeAt(0))).join('');
const comments = (of: string) => parse(of).tokens.filter(({ kind }) => kind === 'comment').map(({ start, end }) => of.slice(start, end));
const lineEnds = (of: string) => of.match(/\r\n|\r|\n/g) ?? [];
const linesIn = (of: string) => of.split(/\r\n|\r|\n/);

function linesWithErrors(of: string): readonly number[] {
  const lineOf = (offset: number) => linesIn(of.slice(0, offset)).length - 1;
  return parse(of).errors.map(({ span }) => lineOf(span.start));
}

/** The same tokens, with other white space between them where there may be any, between number and unit too. */
function respaced(of: string, random: Random): string {
  return betweenTokens(withinQuantities(of, random), random);
}

const spacesOf = (random: Random) => () => random.pick([' ', '  ', '\t', '     ', '\u00a0', ' \u2009 ']);

function withinQuantities(of: string, random: Random): string {
  const spaces = spacesOf(random);
  const tree = parse(of);
  let from = 0;
  const parts = quantitiesIn(tree.statements).map(({ numberSpan, unitSpan, span }) => {
    const units = unitSpan.start < unitSpan.end ? random.pick(['', spaces()]) : '';
    const tolerance = of.slice(Math.max(numberSpan.end, unitSpan.end), span.end).replace(/^\s*(±|\+\/?-)\s*([\d.eE]+(?:(?<=[eE])[+-]\d+)?)\s*(.*)$/u, (_, mark: string, number: string, unit: string) => `${random.pick(['', spaces()])}${mark}${random.pick(['', spaces()])}${number}${unit === '' ? '' : random.pick(['', spaces()])}${unit}`);
    const part = `${of.slice(from, numberSpan.end)}${units}${of.slice(unitSpan.start, unitSpan.end)}${tolerance}`;
    from = span.end;
    return part;
  });
  return parts.join('') + of.slice(from);
}

function quantitiesIn(statements: readonly Statement[]): readonly QuantityValue[] {
  return statements.flatMap(({ values, block }) => [
    ...values.flatMap((value) => (value.kind === 'quantity' ? [value] : value.kind === 'point' ? [value.x, value.y, ...(value.z === null ? [] : [value.z])] : [])),
    ...(block === null ? [] : quantitiesIn(block.statements)),
  ]);
}

function betweenTokens(of: string, random: Random): string {
  const spaces = spacesOf(random);
  const { tokens } = parse(of);
  let from = 0;
  const parts = tokens.map(({ kind, start, end }, index) => {
    const gap = of.slice(from, start);
    from = end;
    const before = tokens[index - 1];
    const atEdge = before === undefined || before.kind === 'newline' || kind === 'newline';
    const mayTouch = kind === 'punctuation' || before?.kind === 'punctuation';
    // What a comment ends with is its own.
    const wanted = before?.kind === 'comment' ? gap : atEdge || mayTouch ? random.pick(['', spaces()]) : gap === '' ? '' : spaces();
    return (gap.startsWith('\ufeff') ? '\ufeff' : '') + wanted + of.slice(start, end);
  });
  return parts.join('') + of.slice(from);
}

/** As the command line would write it, but for where things stand. */
function report(board: string): string {
  const session = new Session();
  session.setText('board.quiet', board);
  const { files, summary } = checkReport([{ path: 'board.quiet', analysis: session.analyseFully('board.quiet'), text: () => board, known: new Set() }], '0');
  return JSON.stringify({ files, summary }, (key, value: unknown) => (key === 'range' ? null : value));
}
