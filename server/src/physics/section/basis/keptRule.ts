/**
 * Gauss-Jacobi and logarithmic rules by their numbers: the same few serve every side of a stack, and finding the nodes
 * is most of the work of a small table.
 */
import { gaussJacobi, type QuadratureRule } from '../../../numeric/gaussJacobi';
import { logRule, type LogRule } from './logRule';

const rules = new Map<string, QuadratureRule>();
const logRules = new Map<string, LogRule>();
const keptLimit = 512;

/** On [-1, 1] with (1 - x)^alpha (1 + x)^beta. */
export function keptRule(count: number, alpha: number, beta: number): QuadratureRule {
  return keptIn(rules, `${count} ${alpha} ${beta}`, () => gaussJacobi(count, alpha, beta));
}

/** On [0, 1] with r^power, and with -ln r too. */
export function keptLogRule(count: number, power: number): LogRule {
  return keptIn(logRules, `${count} ${power}`, () => logRule(count, power));
}

function keptIn<T>(kept: Map<string, T>, key: string, make: () => T): T {
  let value = kept.get(key);
  if (value === undefined) {
    if (keptLimit <= kept.size) kept.clear();
    value = make();
    kept.set(key, value);
  }
  return value;
}
