/** Input that no engineer would write: each gives clear findings, in time in proportion to its size, and never throws. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { everything } from './everything';
import { check, found, layers, nets, resolved, root } from './resolved';

/** Far more than it takes on a busy machine, and far from what a quadratic step would. */
const soon = { timeout: 20_000 };

const run = (rows: string) => `${layers}${nets}run r on TOP for 20 mm { ${rows} }\n`;

describe('a file of', () => {
  it('nothing', () => {
    for (const text of ['', '\n', '\ufeff', ' \t\n', '# only a comment', ';;;']) {
      check(text);
      const project = resolved(text);
      assert.equal(project.complete, true);
      assert.deepEqual(project.files, [root]);
    }
  });

  it('a megabyte of random bytes', soon, () => {
    let seed = 1;
    const bytes = Uint8Array.from({ length: 1 << 20 }, () => (seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0) >>> 24);
    const findings = found(new TextDecoder().decode(bytes));
    assert.ok(0 < findings.length && findings.length < 1000, `${findings.length}`);
    assert.ok(findings.every((finding) => /^(syntax|unit|missing-value|bad-value|unknown-name|duplicate-name|include) /.test(finding)));
  });

  it('a hundred thousand nested braces', soon, () => {
    assert.ok(0 < found('{'.repeat(100_000)).length);
    assert.ok(0 < found(`net A ${'{'.repeat(100_000)}${'}'.repeat(100_000)}`).length);
    assert.ok(0 < found(`run a on TOP for 1 mm ${'{ on TOP '.repeat(100_000)}`).length);
    assert.ok(0 < found('('.repeat(100_000)).length);
  });

  it('one line of a megabyte', soon, () => {
    const name = 'x'.repeat(1 << 20);
    const findings = found(`${layers}net ${name} { swing 1 V }\nrun r on TOP for 1 mm { trace ${name}y 0.2 mm; gap 0.2 mm; trace ${name} 0.2 mm }\n`);
    assert.equal(findings.length, 1);
    assert.match(findings[0], /: no net x+…$/);
    assert.ok(0 < found(`${layers}run r on TOP for 1 mm { ${'trace A 0.1 mm; gap 0.1 mm; '.repeat(36_000)} }`).length);
    assert.ok(0 < found('['.repeat(1 << 20)).length);
    assert.ok(0 < found(`net ${'['.repeat(1 << 19)}..`).length);
  });

  it('thirty thousand families, each of the next', soon, () => {
    const chain = Array.from({ length: 30_000 }, (_, index) => `family f${index} is f${index + 1}\n`).join('');
    const { nets: all, errors } = resolved(`${chain}family f30000 { rise 1 ns }\nnet A is f0\n`);
    assert.deepEqual(errors, []);
    assert.equal(all.get('A')!.rise?.value, 1e-9);
    assert.equal(found(chain.replace('is f30000', 'is f0')).length, 1);
  });

  it('twenty thousand unknown names', soon, () => {
    const text = `${layers}${nets}run r on TOP for 1 mm { ${Array.from({ length: 20_000 }, (_, index) => `trace N${index} 0.1 mm`).join('; gap 0.1 mm; ')} }\n`;
    assert.equal(found(text).length, 20_000);
  });
});

describe('a board of every statement', () => {
  const plain = found(`${everything}net X is Y\n`);
  it('reads alike with CRLF, tabs and a byte-order mark', () => {
    for (const text of [everything.replaceAll('\n', '\r\n'), everything.replaceAll(' ', '\t'), `\ufeff${everything}`, everything.replaceAll(' ', '\u00a0')]) {
      assert.deepEqual(found(`${text}net X is Y\n`), plain);
    }
  });

  it('has places in its CRLF text', () => {
    const text = `${everything}net X is Y\n`.replaceAll('\n', '\r\n');
    const [{ place }] = resolved(text).errors;
    assert.equal(text.slice(place.span.start, place.span.end), 'Y');
  });
});

describe('quantities that cannot be', () => {
  for (const quantity of ['0 mm', '-0.1 mm', '1e300 mm', '1e999 mm', '-1e300 mm', '1e-300 mm', 'NaN mm', 'Infinity mm', '- mm', '0x10 mm', '1,5 mm', '1_000 mm', '٣ mm']) {
    it(`${quantity} is one or two findings at most, and no run`, () => {
      const text = run(`trace A 0.2 mm; gap ${quantity}; trace B 0.2 mm`);
      const findings = found(text);
      assert.ok(0 < findings.length && findings.length <= 2, findings.join('\n'));
      const { runs, complete } = resolved(text);
      assert.deepEqual(runs, []);
      assert.equal(complete, false);
    });
  }

  it('among them traces that overlap', () => check(run('trace A 0.2 mm; gap -0.3 mm; trace B 0.2 mm'), 'bad-value [-0.3 mm]: gap between A and B in run r cannot be -0.3 mm: it has to be more than zero'));
});

describe('a `use`', () => {
  it('in a circle, or leading outside, is one finding', () => {
    assert.equal(found('use "a.quiet"\n', { 'a.quiet': 'use "board.quiet"\n' }).length, 1);
    assert.equal(found('use "../../etc/passwd"\n', { '../../etc/passwd': { problem: 'outside' } }).length, 1);
  });

  it('of one file many times is one file', soon, () => {
    const project = resolved('use "a.quiet"\n'.repeat(10_000), { 'a.quiet': nets });
    assert.equal(project.files.length, 2);
    assert.deepEqual(project.errors, []);
  });
});
