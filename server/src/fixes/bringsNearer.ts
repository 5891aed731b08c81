/**
 * Whether a change brings copper nearer to a conductor on which insulation depends: no fix may. Quietrun
 * knows noise, not what keeps people safe.
 *
 * Compared are distances across the run, from edge to edge: between layers the height stays as it is.
 */
import type { Project, Run } from '../board/model';
import { insulationMatters } from '../rules/touchLimits';

export function bringsNearer(project: Project, before: Run, after: Run): boolean {
  const dangerous = conductorsOf(before).filter(({ name }) => isDangerous(name, project));
  return dangerous.some((conductor) => {
    const same = conductorsOf(after).find(({ identity }) => identity === conductor.identity);
    return same === undefined || isNearer(surroundings(before, conductor), surroundings(after, same));
  });
}

function isDangerous(name: string, project: Project): boolean {
  const net = project.nets.get(name);
  return net !== undefined && insulationMatters(net, project);
}

interface Strip {
  readonly name: string;
  readonly identity: object;
  readonly row: number;
  readonly left: number;
  readonly right: number;
}

function conductorsOf(run: Run): readonly Strip[] {
  return run.rows.flatMap(({ shift, conductors, gaps }, row) => {
    let left: number = shift?.value ?? 0;
    return conductors.map((conductor, index) => {
      const strip = { name: conductor.kind === 'trace' ? conductor.net.name : conductor.name, identity: conductor, row, left, right: left + conductor.width.value };
      left = strip.right + (gaps[index]?.value ?? 0);
      return strip;
    });
  });
}

/** Nearest copper in each row, to the left and to the right; 0 to both sides where it lies above or below. */
function surroundings(run: Run, from: Strip): readonly number[] {
  return run.rows.flatMap((_, row) => {
    const others = conductorsOf(run).filter((strip) => strip.row === row && strip.identity !== from.identity);
    return [
      Math.min(...others.filter(({ left }) => left < from.right).map(({ right }) => Math.max(0, from.left - right))),
      Math.min(...others.filter(({ right }) => from.left < right).map(({ left }) => Math.max(0, left - from.right))),
    ];
  });
}

/** A last bit is not a distance. */
function isNearer(before: readonly number[], after: readonly number[]): boolean {
  return after.some((distance, index) => distance < before[index]! - 1e-9);
}
