import { budgetFault, causeInText, excessInText, receiverInText, remedyInText, voltageInText, type BudgetFault } from './budgetFault';
import { defineRule } from './rule';

export const overBudget = defineRule<BudgetFault>({
  name: 'over-budget',
  severity: 'error',
  documentation: {
    finds: 'A receiver on which the noise of all its neighbours adds up to more than it tolerates.',
    matters: 'What couples onto a quiet net is indistinguishable from its signal: a reading is wrong, a comparator trips, a clock edge counts twice. On the bench it shows now and then and moves when a probe is near; in the text it is a number, before the copper is etched.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net RX_IN { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
run valve-past-rx on TOP for 38 mm {
  trace VALVE_PWM 0.25 mm
  gap   0.30 mm
  trace RX_IN     0.15 mm
}
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net RX_IN { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
run valve-past-rx on TOP for 8 mm {
  trace VALVE_PWM 0.25 mm
  gap   2.50 mm
  trace RX_IN     0.15 mm
}
`,
    models: ['section/solveSection', 'lines/lineResponse', 'lines/lumpedRun'],
  },

  *find({ project, budgets }) {
    for (const budget of budgets) {
      if (budget.verdict === 'over') yield budgetFault(project, budget);
    }
  },

  message: (fault) => {
    const { budget, largest } = fault;
    return `${voltageInText(budget.total ?? NaN, budget)} of ${voltageInText(budget.tolerates, budget)} on ${receiverInText(budget)}, ${excessInText(fault)}: ${causeInText(fault)}. ${remedyInText(largest)}`;
  },
});
