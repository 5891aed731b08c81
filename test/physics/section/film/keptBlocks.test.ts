import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { keptBlock, shapeOf } from '../../../../server/src/physics/section/film/keptBlocks';
import { sideBasis } from '../../../../server/src/physics/section/basis/sideBasis';
import type { Side } from '../../../../server/src/physics/section/basis/side';
import type { Kernel } from '../../../../server/src/physics/section/kernel/layeredKernel';

const side = (x0: number, x1: number, more: Partial<Side> = {}): Side =>
  ({ x0, y0: 1, x1, y1: 1, length: x1 - x0, basis: sideBasis(0, -0.2), order: 3, conductor: -1, layer: 1, ...more });
const kernel = (): Kernel => ({ direct: 1, mirrors: [], rest: null });

describe('shapeOf', () => {
  it('is one for the same side elsewhere, also after the rounding of its place', () => {
    const shape = shapeOf(side(0.1, 0.4));
    assert.equal(shapeOf(side(7.1, 7.4)), shape);
    assert.equal(shape.atOrigin.x0, 0);
    assert.equal(shape.atOrigin.length, shape.atOrigin.x1);
  });

  it('is another for another length, height, basis, order or layer', () => {
    const shape = shapeOf(side(0.1, 0.4));
    for (const other of [side(0.1, 0.41), side(0.4, 0.1), side(0.1, 0.4, { y1: 1.1 }), side(0.1, 0.4, { order: 4 }), side(0.1, 0.4, { layer: 0 }), side(0.1, 0.4, { basis: sideBasis(-0.2, 0) })]) {
      assert.notEqual(shapeOf(other).id, shape.id);
    }
  });
});

describe('keptBlock', () => {
  it('computes once for a kernel, a kind, two shapes and a distance, always in the same place', () => {
    const calls: string[] = [];
    const [one, other] = [kernel(), kernel()];
    const ask = (of: Kernel, kind: 'potential' | 'flux', from: number, gap: number) =>
      keptBlock({ kind, kernel: of, first: shapeOf(side(from, from + 0.3)), second: shapeOf(side(0, 0.5)), apart: 0.3 + gap }, (first, second) => {
        calls.push(`${first.x0} ${second.x0}`);
        return Float64Array.of(second.x0);
      });
    const block = ask(one, 'flux', 0.1, 0.2);
    assert.equal(ask(one, 'flux', 3.1, 0.2), block);
    assert.equal(calls.length, 1);
    assert.equal(calls[0], `0 ${block[0]}`);
    ask(one, 'potential', 0.1, 0.2);
    ask(other, 'flux', 0.1, 0.2);
    ask(one, 'flux', 0.1, 0.2 + 1e-6);
    assert.equal(calls.length, 4);
  });

  it('forgets rather than grow without end', () => {
    const of = kernel();
    const [first, second] = [shapeOf(side(0, 1)), shapeOf(side(0, 2))];
    let computed = 0;
    const ask = (apart: number) => keptBlock({ kind: 'flux', kernel: of, first, second, apart }, () => { computed += 1; return new Float64Array(1 << 16); });
    for (let i = 0; i < 20; i += 1) ask(i);
    assert.equal(computed, 20);
    ask(0);
    assert.equal(computed, 21);
    ask(19);
    assert.equal(computed, 21);
  });
});
