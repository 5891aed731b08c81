/** All that could make a finding go away, the one that changes least first. */
import { dominantCoupling } from '../rules/dominantCoupling';
import { lowMargin } from '../rules/lowMargin';
import { overBudget } from '../rules/overBudget';
import type { Finding } from '../rules/rule';
import { stitchedGuard } from './addStitchedGuard';
import { corrections } from './corrections';
import { declaredNet } from './declareNet';
import type { Fix, FixContext, Proposal } from './fix';
import { groundedShield, shieldGrounded } from './groundShield';
import { judgedByBudget } from './judged';
import { laidOverPlane, laidOverPlaneForLimit } from './loopOverPlane';
import { unusedRemoved } from './removeUnused';
import { movedToLayer } from './moveToLayer';
import { narrowedBand } from './narrowBand';
import { separatedReturns } from './separateReturn';
import { shortenedRun } from './shortenRun';
import { shrunkLoops, shrunkToLimit } from './shrinkLoop';
import { slowedEdges } from './slowEdge';
import { stitchedMoreOften } from './stitchGuard';
import { waived } from './waive';
import { widenedGaps, widenedToClearance } from './widenGap';

/** For a receiver that has too much; each solves for its number. */
const proposers: readonly ((finding: Finding, context: FixContext) => readonly Proposal[])[] = [widenedGaps, shortenedRun, stitchedGuard, movedToLayer, shrunkLoops, laidOverPlane, separatedReturns, shieldGrounded, slowedEdges, narrowedBand];

/** For everything else. */
const makers: readonly ((finding: Finding, context: FixContext) => readonly Fix[])[] = [widenedToClearance, stitchedMoreOften, groundedShield, shrunkToLimit, laidOverPlaneForLimit, corrections, declaredNet, unusedRemoved];

export function fixesFor(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.waived !== null) return [];
  return [...mendingFixes(finding, context), ...waived(finding, context)];
}

/** Those that need no one's judgement afterwards: all but the waiver, of which the reason is still to be written. */
export function mendingFixes(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.waived !== null) return [];
  return [...quieter(finding, context), ...makers.flatMap((make) => make(finding, context))];
}

const onReceivers: ReadonlySet<string> = new Set([overBudget, lowMargin, dominantCoupling].map(({ name }) => name));

function quieter(finding: Finding, context: FixContext): readonly Fix[] {
  if (!onReceivers.has(finding.rule)) return [];
  const judged = proposers
    .flatMap((propose) => propose(finding, context))
    .flatMap((proposal) => judgedByBudget(finding, context, proposal) ?? [])
    .sort((a, b) => Number(b.mends) - Number(a.mends) || a.moves - b.moves);
  return judged.map(({ fix, mends }, index) => ({ ...fix, preferred: mends && index === 0 }));
}
