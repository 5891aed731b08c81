import type { Place, Project } from '../board/model';
import type { Budget, Channel, Contribution } from '../budget/results';
import { budgetFault, placesInFiles, receiverInText, remedyInText, shareOf, voltageInText, type BudgetFault } from './budgetFault';
import { gapsBetween, traceOf } from './gapsBetween';
import { defineRule, type Subject } from './rule';

interface DominantCoupling extends BudgetFault {
  readonly largest: Contribution;
  readonly share: number;
  readonly across: 'gap' | 'elsewhere';
}

export const dominantCoupling = defineRule<DominantCoupling>({
  name: 'dominant-coupling',
  severity: 'information',
  documentation: {
    finds: 'The one place that makes up more than half of a failing budget: shown there, beside the copper to be moved.',
    matters: 'A receiver can lie beside a dozen nets on its way across the board. Nearly always one of them decides, and an hour spent on any other is lost.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net RX_IN     { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
run valve-past-rx on TOP for 38 mm {
  trace VALVE_PWM 0.25 mm
  gap   0.30 mm
  trace RX_IN     0.15 mm
}
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net RX_IN     { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
run valve-past-rx on TOP for 8 mm {
  trace VALVE_PWM 0.25 mm
  gap   2.50 mm
  trace RX_IN     0.15 mm
}
`,
    models: ['section/solveSection', 'lines/lineResponse', 'lines/lumpedRun', 'lines/shares'],
  },

  *find({ project, budgets }) {
    for (const budget of budgets) {
      const [largest] = budget.contributions;
      if (budget.verdict !== 'over' || largest === undefined) continue;
      const share = shareOf(largest, budget);
      const subject = whereItArises(largest);
      const crossed = crossedGap(largest);
      const at = crossed ?? traceOrPlace(largest);
      if (share < clearlyHalf || subject === null || at === null) continue;
      const { limit, unit, wanted } = budgetFault(project, budget);
      yield { at, subject, names: [budget.subject.name, budget.kind, largest.from ?? ''], related: relatedPlaces(project, budget, largest), value: largest.value, limit: limit!, unit: unit!, wanted, budget, largest, share, across: crossed === null ? 'elsewhere' : 'gap' };
    }
  },

  message: ({ budget, largest, share, across }) => {
    const part = 0.995 <= share ? 'all' : `${Math.round(share * 100)} %`;
    const where = across === 'gap' ? 'across this gap' : 'here';
    return `${voltageInText(largest.value, budget)} on ${receiverInText(budget)} from ${largest.from} ${where}: ${part} of what it has${splitInText(largest)}, where ${voltageInText(budget.tolerates, budget)} is tolerated. ${remedyInText(largest)}`;
  },
});

/** Where two causes are alike, their last digits do not make one of them dominate. */
const clearlyHalf = 0.505;

/** Null for the receiver's own noise: it arises nowhere else. */
function whereItArises({ channel, where }: Contribution): Subject | null {
  const kind = kinds[channel];
  return kind === undefined || where === null ? null : { kind, name: where };
}

const kinds: Partial<Record<Channel, Subject['kind']>> = { coupled: 'run', loop: 'loop', 'shared return': 'return', link: 'link' };

/** The gap beside the victim that the coupling crosses; null between layers. */
function crossedGap({ coupling }: Contribution): Place | null {
  const between = coupling === null ? null : gapsBetween(coupling.run, coupling.aggressor, coupling.victim);
  return coupling === null || between === null ? null : coupling.run.rows[between.row]!.gaps[between.gaps[0]!]!.place;
}

function traceOrPlace({ coupling, place }: Contribution): Place | null {
  return coupling === null ? place : (traceOf(coupling.run, coupling.victim)?.whole ?? place);
}

/** `, 91 % of that capacitive`: which of the two fields to fight. */
function splitInText({ coupling }: Contribution): string {
  if (coupling === null) return '';
  const capacitive = Math.abs(coupling.capacitivePart);
  const inductive = Math.abs(coupling.inductivePart);
  const larger = Math.max(capacitive, inductive) / (capacitive + inductive);
  const kind = inductive < capacitive ? 'capacitive' : 'inductive';
  return Number.isFinite(larger) ? `, ${0.995 <= larger ? 'nearly all' : `${Math.round(larger * 100)} %`} of that ${kind}` : '';
}

function relatedPlaces(project: Project, budget: Budget, { coupling }: Contribution) {
  const tolerated = { place: budget.toleratesPlace, message: `${receiverInText(budget)} tolerates ${voltageInText(budget.tolerates, budget)}` };
  if (coupling === null) return placesInFiles(project, [tolerated]);
  const { run, aggressor, victim } = coupling;
  return placesInFiles(project, [
    tolerated,
    { place: traceOf(run, aggressor)?.whole ?? null, message: `${aggressor.name}, the source` },
    { place: traceOf(run, victim)?.whole ?? null, message: `${victim.name}, the receiver` },
  ]);
}
