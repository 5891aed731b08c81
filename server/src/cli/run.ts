/** Runs a command of the command line and answers its exit status. */
import { rules } from '../rules/index';
import { rulePage } from '../rules/rulePage';
import { readArguments, usage, type CheckCommand } from './arguments';
import { baselineOf, comparedWith } from './baseline';
import { loadBaseline, saveBaseline } from './baselineFile';
import { checkedFiles, type CheckedFile } from './checkedFiles';
import { checkReport } from './checkReport';
import { compare } from './compare';
import type { CheckReport, Summary } from './checkSchema';
import { format } from './format';
import { junitOutput } from './junitOutput';
import { paintFor } from './paint';
import { printableWord } from './printable';
import { spacing } from './spacing';
import { sarifOutput } from './sarifOutput';
import { textOutput } from './textOutput';
import { watch, type Watched } from './watch';

export interface Surroundings {
  readonly workingDirectory: string;
  readonly version: string;
  readonly coloured: boolean;
  readonly write: (text: string) => void;
  readonly complain: (text: string) => void;
  /** What is being worked on, on one line that the next takes the place of; null clears it. Absent where nobody watches. */
  readonly progress?: (words: string | null) => void;
  readonly readStandardInput: () => Promise<Uint8Array>;
  /** Ends what would go on: a person has had enough. */
  readonly stop?: AbortSignal;
  /** Serves until the client ends it. */
  readonly serve: () => Promise<void>;
}

export const status = { clean: 0, findings: 1, notRun: 2 } as const;

export async function run(words: readonly string[], around: Surroundings): Promise<number> {
  const answer = readArguments(words);
  if ('refused' in answer) {
    around.complain(`quietrun: ${printableWord(answer.refused)}\n\n${usage}\n`);
    return status.notRun;
  }
  const command = answer.read;
  switch (command.command) {
    case 'check': return command.watch ? watched(command, around) : (await check(command, around)).status;
    case 'format': return status[await format(command, around)];
    case 'spacing': return spacing(command, around);
    case 'compare': return compare(command, around);
    case 'explain': return explain(command.rule, around);
    case 'help': around.write(`${usage}\n`); return status.clean;
    case 'version': around.write(`${around.version}\n`); return status.clean;
    case 'serve': await around.serve(); return status.clean;
  }
}

function watched(command: CheckCommand, around: Surroundings): Promise<number> {
  const tell = (words: string) => around.complain(`quietrun: ${words}\n`);
  return watch({ workingDirectory: around.workingDirectory, check: () => check(command, around), stop: around.stop ?? new AbortController().signal, tell });
}

async function check(command: CheckCommand, around: Surroundings): Promise<Watched> {
  const answer = await checkedFiles({ ...command, ...around, log: (rule, error) => around.complain(`quietrun: ${rule} failed: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`) });
  const named = [...command.files, ...(command.baseline === null ? [] : [command.baseline])];
  const compared = 'refused' in answer ? answer : await withBaseline(answer.checked, command, around);
  if ('refused' in compared) {
    around.complain(`quietrun: ${printableWord(compared.refused)}\n`);
    return { status: status.notRun, files: named };
  }
  const report = checkReport(compared.checked, around.version);
  around.write(outputOf(compared.checked, report, { format: command.format, failOn: command.failOn, around }));
  const used = compared.checked.flatMap(({ analysis: { project } }) => [...project.files, ...project.includes.flatMap((include) => include.path ?? [])]);
  return { status: fails(report.summary, command) ? status.findings : status.clean, files: [...new Set([...named, ...used])] };
}

function outputOf(checked: readonly CheckedFile[], report: CheckReport, { format, failOn, around }: Pick<CheckCommand, 'format' | 'failOn'> & { readonly around: Surroundings }): string {
  switch (format) {
    case 'json': return `${JSON.stringify(report, null, 2)}\n`;
    case 'sarif': return sarifOutput(checked, around.version);
    case 'junit': return junitOutput(checked, failOn);
    case 'text': return textOutput(checked, report.summary, paintFor(around.coloured));
  }
}

/** With what a baseline knows of them; the one that is to be written is written first, and counts. */
async function withBaseline(checked: readonly CheckedFile[], { baseline, updateBaseline }: CheckCommand, { workingDirectory, complain }: Surroundings): Promise<{ readonly checked: readonly CheckedFile[] } | { readonly refused: string }> {
  if (updateBaseline !== null) {
    const refused = await saveBaseline(updateBaseline, workingDirectory, baselineOf(checked, { baselineFile: updateBaseline, workingDirectory }));
    if (refused !== null) return { refused };
  }
  const file = updateBaseline ?? baseline;
  if (file === null) return { checked };
  const loaded = await loadBaseline(file, workingDirectory);
  if ('refused' in loaded) return loaded;
  const { checked: compared, gone } = comparedWith(loaded.baseline, checked, { baselineFile: file, workingDirectory });
  if (0 < gone) complain(`quietrun: ${gone === 1 ? 'a finding' : `${gone} findings`} of ${printableWord(file)} no longer ${gone === 1 ? 'occurs' : 'occur'}; --update-baseline ${printableWord(file)} drops ${gone === 1 ? 'it' : 'them'}\n`);
  return { checked: compared };
}

function fails({ errors, warnings }: Summary, { failOn, maxWarnings }: CheckCommand): boolean {
  return 0 < errors || (failOn === 'warning' && 0 < warnings) || (maxWarnings !== null && maxWarnings < warnings);
}

function explain(name: string | null, around: Surroundings): number {
  if (name === null) {
    const widest = Math.max(...rules.map((rule) => rule.name.length));
    around.write(`${rules.map((rule) => `${rule.name.padEnd(widest)}  ${rule.severity.padEnd(11)}  ${rule.documentation.finds}`).join('\n')}\n`);
    return status.clean;
  }
  const rule = rules.find((each) => each.name === name);
  if (rule === undefined) {
    around.complain(`quietrun: no rule ${printableWord(name)}; quietrun explain lists them\n`);
    return status.notRun;
  }
  around.write(`${rulePage(rule)}\n`);
  return status.clean;
}
