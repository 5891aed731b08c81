import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { writtenLength } from '../../server/src/fixes/writtenLength';
import { metres } from '../../server/src/units/quantity';

const place = { path: 'a', span: { start: 0, end: 1 } };
const given = (value: number) => ({ value: metres(value), tolerance: 0, place });

describe('a length as its file writes it', () => {
  const cases = [
    // written, its value, the new value, outward, expected
    ['0.30 mm', 0.3e-3, 0.9134e-3, 'up', '0.92 mm'],
    ['0.3mm', 0.3e-3, 0.9e-3, 'up', '0.9mm'],
    ['0.30 mm', 0.3e-3, 0.9e-3, 'up', '0.90 mm'],
    ['8 mil', 8 * 25.4e-6, 12.1 * 25.4e-6, 'up', '12.5 mil'],
    ['8mil', 8 * 25.4e-6, 12 * 25.4e-6, 'up', '12mil'],
    ['300 um', 300e-6, 913e-6, 'up', '920 um'],
    ['.3 mm', 0.3e-3, 0.31e-3, 'up', '0.31 mm'],
    ['3e-1 mm', 0.3e-3, 0.455e-3, 'up', '0.46 mm'],
    ['0.0118 in', 0.0118 * 25.4e-3, 0.02 * 25.4e-3, 'up', '0.0200 in'],
    ['1 m', 1, 0.25, 'down', '0.25 m'],
  ] as const;
  for (const [text, value, wanted, outward, expected] of cases) {
    it(`${text} to ${wanted} m: ${expected}`, () => {
      const written = writtenLength(text, given(value), 'section')!;
      const rounded = written.rounded(wanted, outward);
      assert.equal(written.inFile(rounded), expected);
      assert.ok(outward === 'up' ? wanted * (1 - 1e-6) <= rounded : rounded <= wanted * (1 + 1e-6));
      assert.ok(Math.abs(rounded - wanted) <= written.grid * 1.001);
    });
  }

  it('rounds the length of a run ten times coarser', () => {
    const written = writtenLength('38 mm', given(38e-3), 'run')!;
    assert.equal(written.inFile(written.rounded(14.27e-3, 'down')), '14.2 mm');
    assert.equal(written.inFile(written.rounded(14e-3, 'down')), '14 mm');
  });

  it('leaves alone what is not a number and a unit', () => {
    assert.equal(writtenLength('spaced', given(1e-3), 'section'), null);
    assert.equal(writtenLength('0 mm', given(0), 'section'), null);
  });
});
