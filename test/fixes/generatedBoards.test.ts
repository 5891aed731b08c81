/**
 * On boards that nobody wrote, every fix that is offered keeps what its title says, and touches nothing
 * but what it has to.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Project, Run } from '../../server/src/board/model';
import { createSolveCache } from '../../server/src/budget/solveCache';
import type { Evaluation } from '../../server/src/budget/results';
import type { Edit, Fix } from '../../server/src/fixes/fix';
import { fixesFor } from '../../server/src/fixes/index';
import { sufficientGap, sufficientLength } from '../../server/src/fixes/sufficient';
import { voltageInText, type BudgetFault } from '../../server/src/rules/budgetFault';
import type { Finding } from '../../server/src/rules/rule';
import { parse } from '../../server/src/syntax/parse';
import { evaluated, rootPath } from '../support/evaluated';
import { fixing, withEdits } from '../support/fixing';
import { generatedBoard } from '../support/generatedBoard';

const boards = 12;

describe('fixes on generated boards', () => {
  let offered = 0;
  for (let seed = 1; seed <= boards; seed += 1) {
    const text = generatedBoard(seed);
    it(`seed ${seed}`, () => {
      const { findings, context } = fixing(new Map([[rootPath, text]]));
      assert.deepEqual(context.project.errors, [], text);
      const checked = new Set<string>();
      for (const finding of findings) {
        for (const fix of fixesFor(finding, context)) {
          // The receiver and the gap have the same cures: each is computed afresh once.
          const identity = JSON.stringify([fix.title, fix.edits]);
          if (checked.has(identity)) continue;
          checked.add(identity);
          offered += 1;
          checkFix(text, { before: context.evaluation, finding, fix });
        }
      }
    });
  }

  it('offered something to check', () => assert.ok(boards < offered, `${offered} fixes`));
});

describe('sufficient gaps and lengths on generated boards', () => {
  it('are enough, and a step less is not', () => {
    let checked = 0;
    for (let seed = 1; seed <= 6; seed += 1) {
      const { context, project } = fixing(new Map([[rootPath, generatedBoard(seed)]]));
      for (const run of project.runs) {
        const gaps = run.rows.flatMap((row) => row.gaps);
        for (const [index, gap] of gaps.entries()) {
          const found = sufficientGap(context, run, index);
          if (found === null || !found.enough) continue;
          checked += 1;
          assert.equal(found, sufficientGap(context, run, index), 'asked again, it is found, not solved');
          assert.ok(found.evaluations <= 30, `${found.evaluations} evaluations`);
          const { path, span } = gap.place;
          const after = (value: number) => context.evaluateWith([{ path, span, newText: `${value * 1e3} mm` }]);
          const fails = (evaluation: Evaluation) => evaluation.budgets.some((budget) => found.receivers.includes(budget.subject.name) && budget.verdict !== 'pass');
          assert.ok(!fails(after(found.value)), `seed ${seed}, ${run.name}: ${found.written} is not enough`);
          // A step of the file's grid is at most half a mil; two of them are more than rounding can hide.
          const less = found.value - 2 * 0.0127e-3;
          if ((project.board.clearance?.value ?? 0.1e-3) * 1.1 < less) assert.ok(fails(after(less)), `seed ${seed}, ${run.name}: less than ${found.written} is enough`);
        }
        const length = sufficientLength(context, run);
        assert.ok(length === null || 0 < length.value);
      }
    }
    assert.ok(5 < checked, `${checked} gaps`);
  });
});

function checkFix(text: string, { before, finding, fix }: { readonly before: Evaluation; readonly finding: Finding; readonly fix: Fix }): void {
  const after = withEdits(new Map([[rootPath, text]]), fix.edits).get(rootPath)!;
  const words = `${fix.title}\n${after}`;
  // Nothing of the search's state: read and computed afresh.
  const { evaluation, project } = evaluated(new Map([[rootPath, after]]), createSolveCache());
  assert.deepEqual(project.errors, [], words);
  assert.deepEqual(untouchedTokens(after, insertedRanges(fix.edits)), untouchedTokens(text, fix.edits.map(({ span }) => span)), words);
  checkDistances(before.project, project, words);
  const said = /: ([\d.]+ \S+) of ([\d.]+ \S+)(, still over|, still short of the headroom| so far)?$/.exec(fix.title);
  if (said === null) return;
  const { budget } = finding.fault as BudgetFault;
  const now = evaluation.budgets.find(({ subject, kind, measure }) => subject.name === budget.subject.name && kind === budget.kind && measure === budget.measure)!;
  assert.equal(said[1], voltageInText(now.total!, now), words);
  assert.equal(said[2], voltageInText(now.tolerates, now), words);
  assert.equal(now.verdict, said[3] === undefined ? 'pass' : said[3] === ', still over' ? 'over' : said[3] === ' so far' ? 'unknown' : 'low', words);
  assert.ok(now.total! < budget.total!, words);
  assert.ok(noReceiverWorse(before, evaluation), words);
}

/** No copper is nearer to a net with a working voltage than copper was before, beside it or in another layer. */
function checkDistances(before: Project, after: Project, words: string): void {
  before.runs.forEach((run, index) => {
    const [were, are] = [stripsOf(run), stripsOf(after.runs[index]!)];
    for (const hot of were.filter(({ working }) => working)) {
      const same = are.find(({ name }) => name === hot.name)!;
      for (const row of run.rows.keys()) {
        for (const side of ['left', 'right'] as const) {
          const [was, is] = [nearest(were, hot, row, side), nearest(are, same, row, side)];
          assert.ok(was - 1e-9 <= is, `copper ${side} of ${hot.name} in run ${run.name} came from ${was} to ${is}\n${words}`);
        }
      }
    }
  });
}

interface Strip {
  readonly name: string;
  readonly row: number;
  readonly from: number;
  readonly to: number;
  readonly working: boolean;
}

function stripsOf(run: Run): readonly Strip[] {
  return run.rows.flatMap(({ conductors, gaps, shift }, row) => {
    let from: number = shift?.value ?? 0;
    return conductors.map((conductor, index): Strip => {
      const to = from + conductor.width.value;
      const strip = { name: conductor.kind === 'trace' ? conductor.net.name : `guard ${index}`, row, from, to, working: conductor.kind === 'trace' && conductor.net.working !== null };
      from = to + (gaps[index]?.value ?? 0);
      return strip;
    });
  });
}

/** Infinity where there is none on that side. */
function nearest(strips: readonly Strip[], hot: Strip, row: number, side: 'left' | 'right'): number {
  const others = strips.filter((strip) => strip.row === row && strip !== hot);
  return Math.min(...others.map(({ from, to }) => (side === 'left' ? (from < hot.to ? Math.max(0, hot.from - to) : Infinity) : hot.from < to ? Math.max(0, from - hot.to) : Infinity)));
}

function noReceiverWorse(before: Evaluation, after: Evaluation): boolean {
  const rank = { pass: 0, low: 1, unknown: 2, over: 3 };
  return after.budgets.every((budget, index) => rank[budget.verdict] <= rank[before.budgets[index]!.verdict]);
}

function insertedRanges(edits: readonly Edit[]): readonly { start: number; end: number }[] {
  let shift = 0;
  return [...edits].sort((a, b) => a.span.start - b.span.start).map(({ span, newText }) => {
    const start = span.start + shift;
    shift += newText.length - (span.end - span.start);
    return { start, end: start + newText.length };
  });
}

/** Comments are tokens, too. */
function untouchedTokens(text: string, touched: readonly { start: number; end: number }[]): readonly string[] {
  return parse(text).tokens
    .filter((token) => !touched.some(({ start, end }) => token.start < end && start < token.end))
    .map((token) => `${token.kind} ${text.slice(token.start, token.end)}`);
}
