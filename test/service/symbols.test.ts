/** The outline of a file, as text. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { SymbolEntry } from '../../server/src/service/answers';
import { Session } from '../../server/src/service/session';
import { symbols } from '../../server/src/service/symbols';

function outline(text: string): { readonly lines: readonly string[]; readonly entries: readonly SymbolEntry[] } {
  const session = new Session();
  session.setText('a', text);
  const entries = symbols(session, 'a');
  const lines = (list: readonly SymbolEntry[], indent: string): readonly string[] =>
    list.flatMap(({ name, kind, detail, children }) => [`${indent}${kind} ${name}${detail === '' ? '' : ` | ${detail}`}`, ...lines(children, `${indent}  `)]);
  return { lines: lines(entries, ''), entries };
}

const text = `quietrun 1
use "x.quiet"
# 5 µs, 2 Ω 🔌
stackup {
  mask 25 um er 3.4
  copper TOP 35 um
  prepreg 0.20 mm ± 10 % er 4.2
  plane "GND 1" 18 um
}
net D[0..7] is lvcmos33 { rise 1 ns }
run alley for 22 mm { # two rows
  on TOP {
    trace A 0.20 mm
    gap   0.40 mm
    guard GND 0.25 mm stitched 4 mm
  }
  without "GND 1"
}
loop l on TOP { circle 1 mm }
waive over-budget on A because "x"
`;

const expected = [
  'stackup stackup',
  '  mask mask | 25 um er 3.4',
  '  copper TOP | 35 um',
  '  prepreg prepreg | 0.20 mm ± 10 % er 4.2',
  '  plane GND 1 | 18 um',
  'net D[0..7] | is lvcmos33',
  'run alley | for 22 mm',
  '  on TOP',
  '    trace A | 0.20 mm',
  '    gap gap | 0.40 mm',
  '    guard GND | 0.25 mm stitched 4 mm',
  'loop l | on TOP',
];

describe('symbols', () => {
  it('are declarations with rows and layers below them', () => assert.deepEqual(outline(text).lines, expected));
  it('are the same with CRLF', () => assert.deepEqual(outline(text.replaceAll('\n', '\r\n')).lines, expected));

  it('lie within what they belong to, their name within them', () => {
    for (const source of [text, text.replaceAll('\n', '\r\n')]) {
      const visit = (entry: SymbolEntry) => {
        assert.ok(entry.span.start <= entry.nameSpan.start && entry.nameSpan.end <= entry.span.end && entry.nameSpan.start < entry.nameSpan.end);
        assert.ok(source.slice(entry.nameSpan.start, entry.nameSpan.end).includes(entry.name));
        for (const child of entry.children) {
          assert.ok(entry.span.start <= child.span.start && child.span.end <= entry.span.end);
          visit(child);
        }
      };
      outline(source).entries.forEach(visit);
    }
  });

  it('go on where the text is broken', () => assert.deepEqual(outline('net {\nrun r for { trace A\nnet B { swing').lines, ['net net', 'run r', '  trace A', 'net B']));
});
