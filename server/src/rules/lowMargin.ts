import { inText } from '../units/inText';
import { budgetFault, causeInText, receiverInText, remedyInText, voltageInText, type BudgetFault } from './budgetFault';
import { defineRule } from './rule';

interface LowMargin extends BudgetFault {
  readonly headroom: number;
  readonly marginDb: number;
}

export const lowMargin = defineRule<LowMargin>({
  name: 'low-margin',
  severity: 'warning',
  documentation: {
    finds: 'A receiver that is within its budget, but by less than the board’s `headroom`, or that goes over it at a corner of the stated tolerances.',
    matters: 'A prepreg presses thinner, an etch runs wide, a neighbour is rerouted late. The headroom is what a board keeps for that; once it is spent, the next change is a respin.',
    bad: `board quiet-corner { headroom 6 dB }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net FAN { swing 12 V; rise 100 ns; source 10 ohm; load 10 kohm, 1 nF }
net PROBE { source 1 kohm; load 1 Mohm, 47 pF; tolerates 12 mV peak }
run fan-past-probe on TOP for 20 mm {
  trace FAN   0.25 mm
  gap   0.40 mm
  trace PROBE 0.15 mm
}
`,
    good: `board quiet-corner { headroom 6 dB }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net FAN { swing 12 V; rise 100 ns; source 10 ohm; load 10 kohm, 1 nF }
net PROBE { source 1 kohm; load 1 Mohm, 47 pF; tolerates 12 mV peak }
run fan-past-probe on TOP for 20 mm {
  trace FAN   0.25 mm
  gap   1.20 mm
  trace PROBE 0.15 mm
}
`,
    models: ['section/solveSection', 'lines/lineResponse', 'lines/lumpedRun'],
  },

  *find({ project, budgets }) {
    for (const budget of budgets) {
      if (budget.verdict !== 'low' || budget.total === null) continue;
      const marginDb = 20 * Math.log10(budget.tolerates / budget.total);
      yield { ...budgetFault(project, budget), headroom: project.board.headroom?.value ?? 0, marginDb };
    }
  },

  message: (fault) => {
    const { budget, largest, headroom, marginDb } = fault;
    const amount = `${voltageInText(budget.total ?? NaN, budget)} of ${voltageInText(budget.tolerates, budget)} on ${receiverInText(budget)}`;
    if (marginDb < headroom) return `${amount}, ${inText(marginDb, 'level')} of the ${inText(headroom, 'level')} headroom left: ${causeInText(fault)}. ${remedyInText(largest)}`;
    const corner = budget.bounds === null ? '' : `, ${voltageInText(budget.bounds[1], budget)} at a corner of the tolerances`;
    return `${amount}${corner}: ${causeInText(fault)}. ${remedyInText(largest)}, or state closer tolerances`;
  },
});
