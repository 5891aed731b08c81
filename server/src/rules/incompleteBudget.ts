import type { Place, Project } from '../board/model';
import type { Budget, Evaluation, Unaccounted } from '../budget/results';
import { placesInFiles, receiverInText, subjectOf, voltageInText } from './budgetFault';
import { defineRule, type Fault } from './rule';
import { hasUnreadablePart } from './unreadableParts';

interface IncompleteBudget extends Fault {
  /** The receivers that lack the same, the first of which is the subject. */
  readonly budgets: readonly [Budget, ...Budget[]];
  readonly lacks: readonly Unaccounted[];
}

export const incompleteBudget = defineRule<IncompleteBudget>({
  name: 'incomplete-budget',
  severity: 'warning',
  documentation: {
    finds: 'A receiver whose budget lacks something that belongs in it, and what: a value that could not be read, or something that could not be computed.',
    matters: 'A sum with a part missing looks better than the board is. Such a budget has no margin and is never reported as within budget.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
    models: [],
  },

  *find(evaluation) {
    const { project } = evaluation;
    const text = unreadableText(project);
    for (const budget of evaluation.budgets) {
      const lacks = budget.unaccounted.filter(({ place }) => !text.isUnreadable(place) && !text.follows(place));
      if (0 < lacks.length) yield fault(project, [budget], lacks);
    }
    const lacking = lackingText(evaluation, text);
    if (lacking !== null) yield fault(project, lacking.budgets, lacking.lacks);
  },

  message: ({ budgets: [first, ...others], lacks }) => {
    const whom = `${receiverInText(first)}${others.length === 0 ? '' : ` and ${others.length} more`}`;
    const what = lacks.slice(0, shown).map(({ what: words }) => words).join('; ');
    const rest = shown < lacks.length ? `; and ${lacks.length - shown} more` : '';
    if (first.total === null || 0 < others.length) return `no margin on ${whom}: ${what}${rest}`;
    return `${voltageInText(first.total, first)} of ${voltageInText(first.tolerates, first)} so far on ${whom}, and no margin: ${what}${rest}`;
  },
});

const shown = 3;

function fault(project: Project, budgets: readonly [Budget, ...Budget[]], lacks: readonly Unaccounted[]): IncompleteBudget {
  const [first, ...others] = budgets;
  return {
    at: first.subject.place,
    subject: subjectOf(first),
    names: lacks.map(({ what }) => what),
    related: placesInFiles(project, [
      ...lacks.map(({ place, what }) => ({ place, message: what })),
      ...others.slice(0, shown).map((budget) => ({ place: budget.subject.place, message: `${receiverInText(budget)} lacks it, too` })),
    ]),
    budgets,
    lacks,
  };
}

interface UnreadableText {
  /** Something stands there that could not be read. */
  isUnreadable(place: Place | null): boolean;
  /** A trace of a net of which a part could not be read: that it `states no rise` is no second mistake. */
  follows(place: Place | null): boolean;
}

function unreadableText(project: Project): UnreadableText {
  const gaps = new Set(project.gaps.map(({ place }) => startOf(place)));
  const broken = new Set<string>();
  if (0 < gaps.size) {
    const nets = new Set([...project.nets.values()].filter((net) => hasUnreadablePart(project, net)));
    const conductors = project.runs.flatMap(({ rows }) => rows.flatMap((row) => row.conductors));
    for (const conductor of conductors) if (conductor.kind === 'trace' && nets.has(conductor.net)) broken.add(startOf(conductor.whole));
  }
  return { isUnreadable: (place) => place !== null && gaps.has(startOf(place)), follows: (place) => place !== null && broken.has(startOf(place)) };
}

function startOf({ path, span }: Place): string {
  return `${span.start} ${path}`;
}

interface Lacking {
  readonly budgets: readonly [Budget, ...Budget[]];
  readonly lacks: readonly Unaccounted[];
}

/**
 * One unreadable word can leave every budget of a board incomplete, and by several ways at once. What
 * cannot be read has its own finding where it stands; one more says which budgets that takes with it.
 */
function lackingText({ budgets }: Evaluation, text: UnreadableText): Lacking | null {
  const lacks = new Map<string, Unaccounted>();
  const taken = new Map<object, Budget>();
  for (const budget of budgets) {
    const unread = budget.unaccounted.filter(({ place }) => text.isUnreadable(place));
    for (const lack of unread) lacks.set(lack.what, lack);
    if (0 < unread.length && !taken.has(budget.subject)) taken.set(budget.subject, budget);
  }
  const [first, ...others] = taken.values();
  return first === undefined ? null : { budgets: [first, ...others], lacks: [...lacks.values()] };
}
