/** Where new rows go and what a removal takes with it: comments and neighbours stay. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Edit } from '../../server/src/fixes/fix';
import { removal } from '../../server/src/fixes/removal';
import { rowsAfter } from '../../server/src/fixes/rowsAfter';

const rows = [['guard', 'GND 0.25 mm'], ['gap', '0.30 mm']] as const;

function applied(text: string, { span, newText }: Edit): string {
  return text.slice(0, span.start) + newText + text.slice(span.end);
}

function placeOf(text: string, part: string) {
  const start = text.indexOf(part);
  return { path: 'a', span: { start, end: start + part.length } };
}

function checkRows(before: string, after: string): void {
  assert.equal(applied(before, rowsAfter(before, placeOf(before, '0.6 mm'), rows)), after);
  const windows = before.replaceAll('\n', '\r\n');
  assert.equal(applied(windows, rowsAfter(windows, placeOf(windows, '0.6 mm'), rows)), after.replaceAll('\n', '\r\n'));
}

describe('new rows', () => {
  it('stand on lines of their own, in the columns that are there', () =>
    checkRows('run r {\n  trace A 0.2 mm\n  gap   0.6 mm\n  trace B 0.2 mm\n}\n', 'run r {\n  trace A 0.2 mm\n  gap   0.6 mm\n  guard GND 0.25 mm\n  gap   0.30 mm\n  trace B 0.2 mm\n}\n'));

  it('stand below the comment of the row before', () =>
    checkRows('  gap 0.6 mm ± 0.05 mm  # as routed\n  # the quiet one\n  trace B 0.2 mm\n', '  gap 0.6 mm ± 0.05 mm  # as routed\n  guard GND 0.25 mm\n  gap 0.30 mm\n  # the quiet one\n  trace B 0.2 mm\n'));

  it('stay on the line where all stands on one', () =>
    checkRows('run r { trace A 0.2 mm; gap 0.6 mm ± 5 %; trace B 0.2 mm }\n', 'run r { trace A 0.2 mm; gap 0.6 mm ± 5 %; guard GND 0.25 mm; gap 0.30 mm; trace B 0.2 mm }\n'));

  it('stay on the line before a closing brace that is not theirs', () =>
    checkRows('on TOP { trace A 0.2 mm; gap 0.6 mm\n trace B 0.2 mm }\n', 'on TOP { trace A 0.2 mm; gap 0.6 mm; guard GND 0.25 mm; gap 0.30 mm\n trace B 0.2 mm }\n'));
});

describe('a removal', () => {
  const check = (before: string, part: string, after: string) => assert.equal(applied(before, removal(before, placeOf(before, part))), after);

  it('takes the line with it', () => check('net A { }\n  waive x\nnet B { }\n', 'waive x', 'net A { }\nnet B { }\n'));
  it('takes a CRLF line with it', () => check('net A { }\r\nwaive x\r\nnet B { }\r\n', 'waive x', 'net A { }\r\nnet B { }\r\n'));
  it('takes several lines', () => check('net A {\n  rise 1 ns\n}\nnet B { }\n', 'net A {\n  rise 1 ns\n}', 'net B { }\n'));
  it('leaves a comment where it is', () => check('waive x  # since April\nnet B { }\n', 'waive x', '  # since April\nnet B { }\n'));
  it('takes its semicolon', () => check('net A { rise 1 ns; waive x; load 1 kohm }\n', 'waive x', 'net A { rise 1 ns; load 1 kohm }\n'));
  it('takes the semicolon before it where none follows', () => check('net A { rise 1 ns; waive x }\n', 'waive x', 'net A { rise 1 ns }\n'));
  it('takes the last line of a file', () => check('net A { }\nwaive x', 'waive x', 'net A { }\n'));
});
