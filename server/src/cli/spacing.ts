/** `quietrun spacing`: distances for layout, as a table. */
import { insulationWords } from '../rules/insulationCaution';
import type { Spacing, SpacingOptions } from '../spacing/spacing';
import { inText } from '../units/inText';
import { metres, type Length } from '../units/quantity';
import type { SpacingCommand } from './arguments';
import { checkedFiles, type CheckedFile } from './checkedFiles';
import { printableWord } from './printable';
import { status, type Surroundings } from './run';
import { spacingCsv } from './spacingCsv';
import { spacingMarkdown } from './spacingMarkdown';
import { spacingText } from './spacingText';

/** A table with what it rests on, for whichever format. */
export interface SpacingTable extends Spacing {
  readonly title: string;
  readonly gaps: readonly Length[];
  readonly lengths: readonly Length[];
  /** Sentences: what the numbers rest on, and what has none. */
  readonly notes: readonly string[];
}

export async function spacing(command: SpacingCommand, around: Surroundings): Promise<number> {
  const answer = await checkedFiles({ files: [command.file], stdinFilename: null, ...around, log: (rule, error) => around.complain(`quietrun: ${rule} failed: ${String(error)}\n`) });
  if ('refused' in answer) return refused(answer.refused, around);
  const [file] = answer.checked;
  const { project } = file.analysis;
  const unknown = [[command.only.layer, 'layer'], [command.only.from, 'signal'], [command.only.to, 'signal']].find(([name, set]) => name !== null && project.names.get(set as 'layer' | 'signal')?.has(name) !== true);
  if (unknown !== undefined) return refused(`there is no ${unknown[1] === 'layer' ? 'layer' : 'net'} ${unknown[0]} in ${command.file}`, around);
  const options = optionsFor(command, file);
  const table = tableOf(await made(file, options, around), options, file);
  around.write({ text: spacingText, csv: spacingCsv, markdown: spacingMarkdown }[command.format](table));
  if (!file.analysis.project.complete) around.complain(`quietrun: ${printableWord(command.file)} could not be read whole; quietrun check says where\n`);
  return 0 < table.rows.length ? status.clean : status.findings;
}

function refused(why: string, { complain }: Surroundings): number {
  complain(`quietrun: ${printableWord(why)}\n`);
  return status.notRun;
}

/** Gaps from the clearance up, lengths as runs on boards are. */
function optionsFor({ gaps, lengths, width, only, placed }: SpacingCommand, { analysis: { project } }: CheckedFile): SpacingOptions {
  const clearance = project.board.clearance?.value ?? 0.1e-3;
  return {
    gaps: gaps ?? [1, 2, 4].map((times) => metres(Number((times * clearance).toPrecision(12)))),
    lengths: lengths ?? [10e-3, 30e-3, 100e-3].map(metres),
    width, only, placed,
  };
}

/** Told on a terminal once it has taken a second, and from then on about once a second. */
async function made(file: CheckedFile, options: SpacingOptions, { progress }: Surroundings): Promise<Spacing> {
  const steps = file.spacing(options);
  for (let said = Date.now(); ; ) {
    const step = steps.next();
    if (step.done === true) {
      progress?.(null);
      return step.value;
    }
    if (Date.now() - said < 1000) continue;
    said = Date.now();
    progress?.(`${step.value.done} of ${step.value.of} pairs of nets`);
  }
}

function tableOf(spacing: Spacing, { gaps, lengths, width, placed }: SpacingOptions, { path, analysis: { project } }: CheckedFile): SpacingTable {
  const { board } = project;
  const headroom = board.headroom?.value ?? 0;
  const pairs = [...project.pairs.values()].length;
  const notes = [
    `Each number was seen to meet the budget${headroom === 0 ? '' : ` with ${inText(headroom, 'level')} of headroom`}, its error bar added, in a run of the two nets alone; shorter and wider meet it too. Lengths are rounded down, gaps up.`,
    placed
      ? '“room” is what is left of the budget for this one source, with all that reaches the receiver from elsewhere taken off.'
      : '“room” is what is left of the budget with own noise, fields, loops, links and returns taken off, for one source: where several run beside one receiver, they share it. `--placed` takes off what the runs in the file make, too.',
    `Widths: ${width === null ? 'those of the nets where they run, else one common on the board' : inText(width, 'length')}. Ends, edges and planes as the file states them; either direction of the receiver; quantities as drawn, without their tolerances.`,
    '“any”: at every length the nets have, or down to the clearance. “none”: nothing from 1 mm of length, or up to 10 mm of gap, is enough.',
    ...(pairs === 0 ? [] : ['Pairs are not in the table, as sources or as receivers.']),
    ...spacing.leftOut.map(({ names, why }) => (why === 'insulation' ? `No distance is given to ${names.join(', ')}, which ${names.length === 1 ? 'states' : 'state'} a working voltage or one over touch limits. ${insulationWords}` : `${names.join(', ')}: the budget is incomplete, so there is no distance that is known to meet it.`)),
    'A table that is kept does not replace the check of the board as it is laid out.',
  ];
  return { ...spacing, title: `${path}${board.name === null ? '' : `, board ${board.name}`}`, gaps, lengths, notes };
}
