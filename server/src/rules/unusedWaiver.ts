import type { Waiver } from '../board/model';
import type { Budget, Evaluation } from '../budget/results';
import { defineRule, type Fault } from './rule';
import { isRuleName, isWaivable } from './ruleNames';
import { keyOf, waivedBy, waiverOf } from './waivers';

export interface UnusedWaiver extends Fault {
  readonly waiver: Waiver;
  readonly because: 'nothing' | 'not-waivable' | 'hidden-already';
}

export const unusedWaiver = defineRule<UnusedWaiver>({
  name: 'unused-waiver',
  severity: 'warning',
  documentation: {
    finds: 'A `waive` that hides nothing: the finding is gone, another waiver hides it already, or its rule cannot be waived.',
    matters: 'A waiver that outlives its reason hides the next fault of the same kind on the same net, and nobody will remember why.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
waive over-budget on B because "measured on revision A: 40 mV"
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 1 mV peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
waive over-budget on B because "B is read 10 us after A has settled"
waive dominant-coupling on beside because "B is read 10 us after A has settled"
`,
    models: [],
  },

  *find(evaluation, found) {
    const { waivers } = evaluation.project;
    const used = new Set(found.map((finding) => waiverOf(finding, waivers)));
    const hidden = new Set(found.flatMap(({ rule, subject }) => (subject === null ? [] : [keyOf(rule, subject.name)])));
    const matched = (waiver: Waiver) => waivedBy(waiver).some((key) => hidden.has(key));
    for (const waiver of waivers) {
      if (used.has(waiver) || !isRuleName(waiver.rule)) continue;
      const because = matched(waiver) ? 'hidden-already' : isWaivable(waiver.rule) ? 'nothing' : 'not-waivable';
      if (because === 'nothing' && !isDecided(waiver, evaluation)) continue;
      yield { at: waiver.place, subject: null, names: [waiver.rule, ...waiver.subjects], waiver, because };
    }
  },

  message: ({ waiver: { rule, subjects }, because }) => {
    const on = subjects.length === 0 ? '' : ` on ${subjects.length === 1 ? subjects[0] : `${subjects[0]} and ${subjects.length - 1} more`}`;
    switch (because) {
      case 'nothing': return `nothing to waive: there is no ${rule}${on} any more`;
      case 'hidden-already': return `nothing to waive: another waiver hides ${rule}${on} already`;
      case 'not-waivable': return `${rule} cannot be waived: the text has to be mended`;
    }
  },
});

/** What is not computed yet may still turn out to be what the waiver is for. */
function isDecided({ rule, subjects }: Waiver, { project, budgets }: Evaluation): boolean {
  if (!project.complete) return false;
  const concerns = ({ subject }: Budget) => rule === 'dominant-coupling' || subjects.includes(subject.name);
  return !['over-budget', 'low-margin', 'dominant-coupling'].includes(rule) || budgets.every((budget) => budget.complete || !concerns(budget));
}
