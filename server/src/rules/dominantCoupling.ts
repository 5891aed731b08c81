import type { Place, Project } from '../board/model';
import type { Budget, Contribution } from '../budget/results';
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
    models: ['section/solveSection', 'lines/lineResponse', 'lines/lumpedRun', 'lines/shares'],
  },

  *find({ project, budgets }) {
    for (const budget of budgets) {
      const [largest] = budget.contributions;
      if (budget.verdict !== 'over' || largest === undefined) continue;
      const share = shareOf(largest, budget);
      const subject = whereItArises(project, largest);
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

/** Null for the receiver's own noise: it arises nowhere else. A field acts in a loop or a run, and so may what a return drops. */
function whereItArises(project: Project, { channel, where, place }: Contribution): Subject | null {
  if (where === null || place === null) return null;
  if (channel === 'coupled') return { kind: 'run', name: where };
  const ways = [['loop', project.loops], ['return', project.returns], ['link', project.links], ['run', project.runs]] as const;
  for (const [kind, all] of ways) {
    const declared = all.find((each) => each.place === place);
    if (declared !== undefined) return { kind, name: declared.name };
  }
  const run = channel === 'radiated' ? project.runs.find(({ name }) => name === where) : undefined;
  return run === undefined ? null : { kind: 'run', name: run.name };
}

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

function relatedPlaces(project: Project, budget: Budget, largest: Contribution) {
  const tolerated = { place: budget.toleratesPlace, message: `${receiverInText(budget)} tolerates ${voltageInText(budget.tolerates, budget)}` };
  const { coupling } = largest;
  if (coupling === null) return placesInFiles(project, [tolerated, ...bothSides(project, budget, largest)]);
  const { run, aggressor, victim } = coupling;
  return placesInFiles(project, [
    tolerated,
    { place: traceOf(run, aggressor)?.whole ?? null, message: `${aggressor.name}, the source` },
    { place: traceOf(run, victim)?.whole ?? null, message: `${victim.name}, the receiver` },
  ]);
}

/** Where a loop or a return names the source, and where one names the receiver. */
function bothSides({ loops, returns }: Project, { subject }: Budget, { channel, from, place }: Contribution) {
  const receivers: readonly unknown[] = subject.kind === 'net' ? [subject] : [subject, subject.plus, subject.minus];
  const shared = returns.find((each) => each.place === place);
  const senses = channel === 'loop' ? loops.flatMap((loop) => loop.senses) : (shared?.refers ?? []);
  const carries = channel === 'loop' ? loops.filter((loop) => loop.place === place).flatMap((loop) => loop.carries) : (shared?.carries ?? []);
  return [
    ...carries.filter(({ net }) => net.name === from).map((each) => ({ place: each.place, message: `${each.net.name}, the source` })),
    ...senses.filter(({ signal }) => receivers.includes(signal)).map((each) => ({ place: each.place, message: `${each.signal.name}, the receiver` })),
  ];
}
