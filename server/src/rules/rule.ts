/**
 * What a rule is: one value in one file that looks at an evaluated project and yields what is wrong
 * with it. `find` formats no text; `message` and the fixes work from the finding it yielded.
 */
import type { Place } from '../board/model';
import type { Evaluation } from '../budget/results';
import { isWaivable, type RuleName } from './ruleNames';

export type Severity = 'error' | 'warning' | 'information' | 'hint';

export interface Fault {
  /** What is underlined. */
  readonly at: Place;
  readonly subject: Subject | null;
  readonly related?: readonly RelatedPlace[];
  /** Further names that tell this fault from others of its rule on its subject; they stand in the baseline key. */
  readonly names?: readonly string[];
  /** Replacements that would mend it, best first, where the rule knows some. */
  readonly corrections?: readonly FaultCorrection[];
  /** What was compared, SI, and its unit, for machines. */
  readonly value?: number;
  readonly limit?: number;
  readonly unit?: string;
}

export interface Subject {
  readonly kind: 'net' | 'pair' | 'run' | 'loop' | 'return' | 'link' | 'shield' | 'ambient' | 'family' | 'board';
  readonly name: string;
}

export interface FaultCorrection {
  readonly title: string;
  readonly place: Place;
  readonly newText: string;
}

export interface RelatedPlace {
  readonly place: Place;
  readonly message: string;
}

export interface Rule<F extends Fault = Fault> {
  /** Kebab-case; names the fault. */
  readonly name: RuleName;
  readonly severity: Severity;
  readonly documentation: RuleDocumentation;
  /** False for rules on the text itself and for `unused-waiver`. */
  readonly waivable: boolean;
  /** `found`: what the rules before it in the list found, waivers applied. */
  readonly find: (evaluation: Evaluation, found: readonly Finding[]) => Iterable<F>;
  readonly message: (fault: F) => string;
}

export interface RuleDocumentation {
  /** What it finds. */
  readonly finds: string;
  /** Why that matters on a real board. */
  readonly matters: string;
  /** A board file that it finds fault with, and one that it does not: both run as tests. */
  readonly bad: string;
  readonly good: string;
  /** The models that its numbers rest on, as paths below `physics/`; empty where it rests on none. */
  readonly models: readonly string[];
}

/** Erases the type of the fault: a rule's `message` is only ever given what its own `find` yielded. */
export function defineRule<F extends Fault>(rule: Omit<Rule<F>, 'waivable'>): Rule {
  return { ...rule, waivable: isWaivable(rule.name) } as unknown as Rule;
}

/** A fault with its words, as every front end shows it. */
export interface Finding {
  readonly rule: string;
  readonly severity: Severity;
  readonly message: string;
  readonly at: Place;
  readonly subject: Subject | null;
  readonly related: readonly RelatedPlace[];
  readonly value: number | null;
  readonly limit: number | null;
  readonly unit: string | null;
  /** The reason of the waiver that hides it. */
  readonly waived: string | null;
  /** Baseline key: rule and names, no line. */
  readonly key: string;
  /** The structured fault, for the fixes. */
  readonly fault: Fault;
}
