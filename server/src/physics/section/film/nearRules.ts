/**
 * Rules on parts of a side with as many nodes as the distance of a singularity asks for.
 *
 * Method    the Gauss error of a polynomial of degree d times a function that is analytic inside Bernstein's ellipse is
 *           ellipse^(d - 2n); the ellipse goes through the nearest singularity of the kernel, or of the edge's power where
 *           the part lies next to one that ends in it
 */
import { partRule, type PartRule } from '../basis/partRule';
import type { SideBasis } from '../basis/sideBasis';

/** ln of the accuracy, relative to the largest entry. */
const digits = 13;
/** Of the ellipse through a point one part's length off its end, where the edge's power is singular. */
const besideEdge = Math.log(3 + Math.sqrt(8));
/** Few kinds of rule: making one costs as much as a dozen uses. */
const counts = [4, 6, 8, 10, 13, 16];

/** `relative` is the distance of the kernel's singularity over the part's length; level 0 is the whole side. */
export function nearRule(basis: SideBasis, level: number, index: number, relative: number, order: number): PartRule {
  const ellipse = Math.log(2 * relative + Math.sqrt(4 * relative * relative + 1));
  const tame = level === 0 ? ellipse : Math.min(ellipse, besideEdge);
  const wanted = Math.max((digits + order) / (2 * tame), level === 0 ? order : 0);
  let at = 0;
  while (at < counts.length - 1 && counts[at] < wanted) at += 1;
  const count = counts[at];
  if (level === 0) return basis.whole(count);
  let rules = kept.get(basis);
  if (rules === undefined) kept.set(basis, (rules = new Map()));
  const key = (2 ** level + index) * 32 + count;
  let rule = rules.get(key);
  if (rule === undefined) rules.set(key, (rule = partRule(basis, level, index, count)));
  return rule;
}

const kept = new WeakMap<SideBasis, Map<number, PartRule>>();
