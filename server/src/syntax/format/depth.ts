/** How deep each place of a text is indented: once for each block around it, and once more where a statement goes on. */
import type { SourceTree, Statement } from '../tree';

export interface Levels {
  readonly first: number;
  readonly least: number;
  readonly last: number;
}

/** Answers for the stretch of a line, line by line in the order of the text. */
export function depthAlong({ text, statements }: SourceTree): (start: number, end: number) => Levels {
  const steps: Step[] = [];
  collect(statements, text, steps);
  let next = 0;
  let level = 0;
  const passTo = (offset: number): number => {
    let least = level;
    for (; next < steps.length && steps[next]!.at <= offset; next += 1) {
      level += steps[next]!.by;
      least = Math.min(least, level);
    }
    return least;
  };
  return (start, end) => {
    passTo(start);
    const first = level;
    const least = passTo(end);
    return { first, least, last: level };
  };
}

interface Step {
  readonly at: number;
  readonly by: 1 | -1;
}

function collect(statements: readonly Statement[], text: string, steps: Step[]): void {
  for (const { span, block } of statements) {
    if (block === null) {
      steps.push({ at: span.start + 1, by: 1 }, { at: span.end, by: -1 });
      continue;
    }
    // Where the brace was left out, the block begins with its first statement.
    steps.push({ at: text[block.span.start] === '{' ? block.span.start + 1 : block.span.start, by: 1 });
    collect(block.statements, text, steps);
    steps.push({ at: block.closed ? block.span.end - 1 : block.span.end, by: -1 });
  }
}
