/** The numbers of a return: its resistance at dc, its inductance, and the largest drop that each net makes over it. */
import type { Project, SharedReturn } from '../../board/model';
import type { ReturnResult } from '../results';
import type { SolveCache } from '../solveCache';
import { atRest, returnImpedance } from './returnImpedance';

export function returnResult(project: Project, shared: SharedReturn, cache: SolveCache): ReturnResult {
  const { resistance, inductance, errorBar, assumptions } = returnImpedance(shared, project, cache);
  return { shared, resistance: resistance(atRest), inductance, errorBar, assumptions };
}
