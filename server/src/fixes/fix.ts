/** What a fix is, and what it is given to find its number with. */
import type { Place, Project } from '../board/model';
import type { Evaluation } from '../budget/results';
import type { Span } from '../syntax/tree';

export interface Edit {
  readonly path: string;
  readonly span: Span;
  readonly newText: string;
}

export interface Fix {
  /** With the outcome that it was seen to have: `Widen the gap to 0.92 mm: 1.00 mV of 2 mV`. */
  readonly title: string;
  /** The rule of the finding that it mends, and where that stands. */
  readonly rule: string;
  readonly at: Place;
  readonly edits: readonly Edit[];
  /** The one that changes least of those that mend the finding. */
  readonly preferred: boolean;
}

export interface FixContext {
  readonly project: Project;
  readonly evaluation: Evaluation;
  text(path: string): string;
  /** The whole way from text: what a fix is judged by. */
  evaluateWith(edits: readonly Edit[]): Evaluation;
  /** Of a changed model, from what is solved already: what a search tries its numbers on. */
  evaluateProject(project: Project): Evaluation;
}

/** A change that might mend a finding, before it was seen to. */
export interface Proposal {
  /** What it does, without the outcome: `Widen the gap to 0.92 mm`. */
  readonly words: string;
  readonly edits: readonly Edit[];
  /** Metres by which copper moves or is added: the less, the better. */
  readonly moves: number;
}
