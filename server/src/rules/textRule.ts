/**
 * A rule on the text itself: the parser and the resolver found the fault and wrote its words; the
 * rule gives it its place among the others, its severity and its page.
 */
import type { BoardError } from '../board/model';
import type { Evaluation } from '../budget/results';
import { defineRule, type Fault, type Rule, type RuleDocumentation } from './rule';

export interface TextFault extends Fault {
  readonly words: string;
}

export function textRule(name: BoardError['rule'], documentation: RuleDocumentation, more: (evaluation: Evaluation) => Iterable<TextFault> = () => []): Rule {
  return defineRule<TextFault>({
    name,
    severity: 'error',
    documentation,

    *find(evaluation) {
      for (const error of evaluation.project.errors) {
        if (error.rule === name) yield { at: error.place, subject: null, names: [error.message], related: error.related, corrections: error.corrections, words: error.message };
      }
      yield* more(evaluation);
    },

    message: ({ words }) => words,
  });
}
