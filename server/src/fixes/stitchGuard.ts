/** Ties a guard as often as it takes to hold at the fastest edge of its run. */
import { guardUnstitched, type GuardUnstitched } from '../rules/guardUnstitched';
import type { Finding } from '../rules/rule';
import { roundDown } from './addStitchedGuard';
import type { Edit, Fix, FixContext } from './fix';
import { textAt } from './gapAdjustable';
import { judgedByFinding } from './judged';
import { replacement, writtenLength } from './writtenLength';

export function stitchedMoreOften(finding: Finding, context: FixContext): readonly Fix[] {
  if (finding.rule !== guardUnstitched.name) return [];
  const { loose: { guard, largest } } = finding.fault as GuardUnstitched;
  const given = guard.stitched ?? guard.width;
  const written = writtenLength(textAt(context, given.place), 'section');
  if (written === null) return [];
  const value = written.inUnit(written.rounded(roundDown(largest), 'down'));
  const { path, span } = guard.whole;
  const edit: Edit = guard.stitched === null ? { path, span: { start: span.end, end: span.end }, newText: ` stitched ${value}` } : replacement(guard.stitched.place, value);
  const fix = judgedByFinding(finding, context, `Stitch ${guard.name} every ${value}, where it holds`, [edit]);
  return fix === null ? [] : [{ ...fix, preferred: true }];
}
