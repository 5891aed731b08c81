/**
 * The nodes of all sides of a conductor, each side's rule as fine as the distance of another conductor asks for. Memory is
 * kept from one conductor to the next.
 */
import type { PartRule } from '../basis/partRule';
import type { Side } from '../basis/side';
import { farPoints } from './sideBlock';

export class NodeSet {
  readonly rules: PartRule[] = [];
  x = new Float64Array(64);
  y = new Float64Array(64);
  growing = new Float64Array(0);
  cosine = new Float64Array(0);
  sine = new Float64Array(0);
  count = 0;

  place(sides: readonly Side[], distance: number): void {
    this.rules.length = 0;
    this.count = 0;
    for (const side of sides) {
      const rule = side.basis.whole(farPoints(distance / side.length));
      if (this.x.length < this.count + rule.count) this.grow();
      for (let i = 0; i < rule.count; i += 1) {
        this.x[this.count + i] = side.x0 + (side.x1 - side.x0) * rule.t[i];
        this.y[this.count + i] = side.y0 + (side.y1 - side.y0) * rule.t[i];
      }
      this.rules.push(rule);
      this.count += rule.count;
    }
  }

  /** Points given by their places in a conductor whose left end is at `left`. */
  placePoints(x: Float64Array, y: Float64Array, left: number): void {
    this.count = x.length;
    while (this.x.length < this.count) this.grow();
    for (let i = 0; i < x.length; i += 1) {
      this.x[i] = left + x[i];
      this.y[i] = y[i];
    }
  }

  /** e^(2 q (x - centre)), and cos and sin of 2 q (y - low), for sums over the images between two planes. */
  placeWaves(q: number, centre: number, low: number): void {
    if (this.growing.length < this.count) {
      this.growing = new Float64Array(this.x.length);
      this.cosine = new Float64Array(this.x.length);
      this.sine = new Float64Array(this.x.length);
    }
    for (let i = 0; i < this.count; i += 1) {
      this.growing[i] = Math.exp(2 * q * (this.x[i] - centre));
      this.cosine[i] = Math.cos(2 * q * (this.y[i] - low));
      this.sine[i] = Math.sin(2 * q * (this.y[i] - low));
    }
  }

  private grow(): void {
    const [x, y] = [this.x, this.y];
    this.x = new Float64Array(2 * x.length);
    this.y = new Float64Array(2 * y.length);
    this.x.set(x);
    this.y.set(y);
  }
}
