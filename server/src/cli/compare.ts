/** `quietrun compare`: what a revision did to the margins. */
import { createSolveCache } from '../budget/solveCache';
import { comparisonOf, type Comparison } from '../compare/compare';
import { parse } from '../syntax/parse';
import type { CompareCommand } from './arguments';
import { checkedFiles, type CheckedFile } from './checkedFiles';
import { comparisonMarkdown } from '../service/comparison/comparisonMarkdown';
import { comparisonText } from './comparisonText';
import { paintFor } from './paint';
import { printableWord } from './printable';
import { status, type Surroundings } from './run';

export async function compare({ before, after, format }: CompareCommand, around: Surroundings): Promise<number> {
  const read = async (file: string) => checkedFiles({ files: [file], stdinFilename: null, ...around, log: (rule, error) => around.complain(`quietrun: ${rule} failed: ${String(error)}\n`) });
  // Each from its own folder, with the files that it uses there.
  const [old, now] = [await read(before), await read(after)];
  for (const answer of [old, now]) {
    if ('refused' in answer) {
      around.complain(`quietrun: ${printableWord(answer.refused)}\n`);
      return status.notRun;
    }
  }
  const [[oldFile], [newFile]] = [old, now].map((answer) => (answer as { checked: readonly CheckedFile[] }).checked);
  for (const [file, name] of [[oldFile, before], [newFile, after]] as const) {
    if (!file.analysis.project.complete) around.complain(`quietrun: ${printableWord(name)} could not be read whole, and is compared as far as it could; quietrun check says where\n`);
  }
  const comparison = made(oldFile, newFile, around);
  const title = { before, after };
  around.write(format === 'markdown' ? comparisonMarkdown(comparison, title) : comparisonText(comparison, title, paintFor(around.coloured)));
  return comparison.moved.some(({ isWorseThanAllowed }) => isWorseThanAllowed) ? status.findings : status.clean;
}

function made(before: CheckedFile, after: CheckedFile, { progress }: Surroundings): Comparison {
  const trees = ({ analysis: { project }, text }: CheckedFile) => project.files.map((path) => parse(text(path)));
  const steps = comparisonOf(trees(before), trees(after), createSolveCache());
  for (let said = Date.now(); ; ) {
    const step = steps.next();
    if (step.done === true) {
      progress?.(null);
      return step.value;
    }
    if (Date.now() - said < 1000) continue;
    said = Date.now();
    progress?.(`${step.value.done} of ${step.value.of} changes`);
  }
}
