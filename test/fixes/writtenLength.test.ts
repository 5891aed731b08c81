import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { parse } from '../../server/src/syntax/parse';
import { writtenLength } from '../../server/src/fixes/writtenLength';

describe('a length as its file writes it', () => {
  const cases = [
    // written, the new value, outward, expected
    ['0.30 mm', 0.9134e-3, 'up', '0.92 mm'],
    ['0.3mm', 0.9e-3, 'up', '0.9mm'],
    ['0.30 mm', 0.9e-3, 'up', '0.90 mm'],
    ['8 mil', 12.1 * 25.4e-6, 'up', '12.5 mil'],
    ['8mil', 12 * 25.4e-6, 'up', '12mil'],
    ['300 um', 913e-6, 'up', '920 um'],
    ['.3 mm', 0.31e-3, 'up', '0.31 mm'],
    ['3e-1 mm', 0.455e-3, 'up', '0.46 mm'],
    ['0.0118 in', 0.02 * 25.4e-3, 'up', '0.0200 in'],
    ['1 m', 0.25, 'down', '0.25 m'],
  ] as const;
  for (const [text, wanted, outward, expected] of cases) {
    it(`${text} to ${wanted} m: ${expected}`, () => {
      const written = writtenLength(text, 'section')!;
      const rounded = written.rounded(wanted, outward);
      assert.equal(written.inFile(rounded), expected);
      assert.equal(rounded, quantityIn(`run r for ${expected} { }`), 'is read again as what was computed with');
      assert.ok(outward === 'up' ? wanted * (1 - 1e-6) <= rounded : rounded <= wanted * (1 + 1e-6));
      assert.ok(Math.abs(rounded - wanted) <= written.grid * 1.001);
    });
  }

  it('rounds the length of a run ten times coarser', () => {
    const written = writtenLength('38 mm', 'run')!;
    assert.equal(written.inFile(written.rounded(14.27e-3, 'down')), '14.2 mm');
    assert.equal(written.inFile(written.rounded(14e-3, 'down')), '14 mm');
  });

  it('leaves alone what is not a number and a unit', () => {
    assert.equal(writtenLength('spaced', 'section'), null);
    assert.equal(writtenLength('4R7', 'section'), null);
  });
});

function quantityIn(text: string): number {
  const value = parse(text).statements[0]!.values.find(({ kind }) => kind === 'quantity');
  return value?.kind === 'quantity' ? value.value : NaN;
}
