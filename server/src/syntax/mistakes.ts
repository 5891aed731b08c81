/** Collects what is wrong with a text, and stops collecting before a file of garbage buries its reader. */
import type { Correction, Span, TextError, TextRule } from './tree';

/** Enough for any text that a person is working on. */
const most = 200;

export class Mistakes {
  private readonly errors: TextError[] = [];
  private kept = true;

  report(rule: TextRule, span: Span, message: string, corrections: readonly Correction[] = []): void {
    if (most <= this.errors.length) {
      if (this.kept) this.errors.push({ rule: 'syntax', span, message: `more mistakes follow; the first ${most} are shown`, corrections: [] });
      this.kept = false;
      return;
    }
    this.errors.push({ rule, span, message, corrections });
  }

  get all(): readonly TextError[] {
    return this.errors;
  }
}

/** Text of the user's as a message quotes it, in backquotes. */
export function quoted(text: string): string {
  return `\`${plainly(text)}\``;
}

/** Short, on one line, without what could disturb a terminal or close a quotation. */
export function plainly(text: string): string {
  const short = [...text.slice(0, 90)].slice(0, 40).join('');
  const clean = short.replace(/[\p{Cc}\p{Cf}\u2028\u2029]/gu, '\ufffd').replaceAll('`', "'");
  return `${clean}${short.length < text.length ? '…' : ''}`;
}
