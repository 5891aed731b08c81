/** Runs a command of the command line and answers its exit status. */
import { rules } from '../rules/index';
import { rulePage } from '../rules/rulePage';
import { readArguments, usage, type CheckCommand } from './arguments';
import { checkedFiles } from './checkedFiles';
import { checkReport } from './checkReport';
import type { Summary } from './checkSchema';
import { paintFor } from './paint';
import { printableWord } from './printable';
import { textOutput } from './textOutput';

export interface Surroundings {
  readonly workingDirectory: string;
  readonly version: string;
  readonly coloured: boolean;
  readonly write: (text: string) => void;
  readonly complain: (text: string) => void;
  readonly readStandardInput: () => Promise<string>;
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
    case 'check': return check(command, around);
    case 'explain': return explain(command.rule, around);
    case 'help': around.write(`${usage}\n`); return status.clean;
    case 'version': around.write(`${around.version}\n`); return status.clean;
    case 'serve': await around.serve(); return status.clean;
  }
}

async function check(command: CheckCommand, around: Surroundings): Promise<number> {
  const answer = await checkedFiles({ ...command, ...around, log: (rule, error) => around.complain(`quietrun: ${rule} failed: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`) });
  if ('refused' in answer) {
    around.complain(`quietrun: ${printableWord(answer.refused)}\n`);
    return status.notRun;
  }
  const report = checkReport(answer.checked, around.version);
  around.write(command.format === 'json' ? `${JSON.stringify(report, null, 2)}\n` : textOutput(answer.checked, report.summary, paintFor(around.coloured)));
  return fails(report.summary, command.failOn) ? status.findings : status.clean;
}

function fails({ errors, warnings }: Summary, failOn: 'error' | 'warning'): boolean {
  return 0 < errors || (failOn === 'warning' && 0 < warnings);
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
