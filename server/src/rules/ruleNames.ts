/**
 * Every rule name of language version 1, and what a waiver may do with it. Other people's boards and
 * baselines rely on these words.
 */
interface RuleEntry {
  /** False for rules about the text itself and for `unused-waiver`. */
  readonly waivable: boolean;
}

const physical: RuleEntry = { waivable: true };
const textual: RuleEntry = { waivable: false };

const entries = {
  'over-budget': physical,
  'low-margin': physical,
  'dominant-coupling': physical,
  'incomplete-budget': physical,
  'gap-below-clearance': physical,
  'insulation-caution': physical,
  'loop-too-large': physical,
  'emission-over-limit': physical,
  'no-return-path': physical,
  'guard-unstitched': physical,
  'floating-shield': physical,
  'missing-termination': physical,
  'outside-model': physical,
  'unused-declaration': physical,
  'unused-waiver': textual,
  'bad-value': textual,
  syntax: textual,
  unit: textual,
  'unknown-name': textual,
  'duplicate-name': textual,
  'missing-value': textual,
  include: textual,
} as const satisfies Record<string, RuleEntry>;

export type RuleName = keyof typeof entries;

export const ruleNames = Object.keys(entries) as readonly RuleName[];

const byName: ReadonlyMap<string, RuleEntry> = new Map(Object.entries(entries));

export function isRuleName(word: string): word is RuleName {
  return byName.has(word);
}

export function isWaivable(rule: RuleName): boolean {
  return entries[rule].waivable;
}
