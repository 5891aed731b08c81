/** The numbers of a loop that do not depend on what drives it. */
import type { Loop, Project } from '../../board/model';
import type { LoopResult, MutualResult } from '../results';
import type { Roles } from '../roles';
import { emissionOf } from './emission';
import type { LoopInductances } from './loopInductances';

export function loopResult(project: Project, loop: Loop, roles: Roles, inductances: LoopInductances): LoopResult {
  const numbers = inductances.of(loop);
  const own = () => (numbers.own !== null && 'inductance' in numbers.own ? numbers.own : null);
  return {
    loop,
    area: numbers.measures?.area ?? null,
    perimeter: numbers.measures?.perimeter ?? null,
    get inductance() { return own()?.inductance ?? null; },
    get inductanceError() { return own()?.errorBar ?? null; },
    emission: emissionOf(project, loop, roles, inductances),
    get mutual() {
      return project.loops.flatMap((other): readonly MutualResult[] => {
        const found = other === loop ? null : inductances.mutual(loop, other);
        return found === null || 'refused' in found ? [] : [{ other, inductance: found.inductance, errorBar: found.errorBar }];
      });
    },
  };
}
