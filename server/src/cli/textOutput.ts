/** What a check found, for a person: each file's budgets, then its findings with their lines underlined. */
import type { Place } from '../board/model';
import type { Finding } from '../rules/rule';
import { budgetTable } from './budgetTable';
import type { CheckedFile } from './checkedFiles';
import type { Summary } from './checkSchema';
import type { Paint } from './paint';
import { linesOf, type Lines } from './positions';
import { printable, printableWord } from './printable';

export function textOutput(checked: readonly CheckedFile[], summary: Summary, paint: Paint): string {
  const blocks = checked.flatMap((file) => {
    const lines = linesOfFiles(file);
    return [heading(file, paint), ...file.analysis.findings.map((finding) => findingBlock(finding, { isKnown: file.known.has(finding), linesIn: lines, paint }))];
  });
  return `${[...blocks, summaryLine(summary, checked, paint)].join('\n\n')}\n`;
}

function heading({ path, analysis }: CheckedFile, paint: Paint): string {
  const { project, evaluation } = analysis;
  const named = project.board.name === null ? '' : `  board ${printable(project.board.name)}`;
  return [paint.strong(`${printableWord(path)}${named}`), ...budgetTable(evaluation.budgets, paint)].join('\n');
}

type LinesOf = (path: string) => Lines;

/** Each text is taken apart once, not once a finding: one of 80 000 lines with a mistake in each took minutes. */
function linesOfFiles({ text }: CheckedFile): LinesOf {
  const known = new Map<string, Lines>();
  return (path) => {
    const lines = known.get(path) ?? linesOf(text(path));
    known.set(path, lines);
    return lines;
  };
}

function findingBlock(finding: Finding, { isKnown, linesIn, paint }: { readonly isKnown: boolean; readonly linesIn: LinesOf; readonly paint: Paint }): string {
  const { rule, severity, message, waived, related } = finding;
  const colour = waived !== null || isKnown || severity === 'hint' ? paint.faint : paint[severity];
  const { where, shown } = underlined(finding.at, linesIn, colour);
  return [
    `${where}  ${colour(`${waived !== null ? 'waived' : isKnown ? 'known' : severity}[${rule}]`)}`,
    ...shown,
    `  ${printable(message).split('\n').join('\n  ')}`,
    ...(waived === null ? [] : [`  waived: ${printable(waived)}`]),
    ...related.map((each) => paint.faint(`  ${underlined(each.place, linesIn, paint.faint).where}  ${printable(each.message)}`)),
  ].join('\n');
}

/** Longer lines are cut around what is underlined. */
const widest = 110;

function underlined({ path, span }: Place, linesIn: LinesOf, colour: (text: string) => string): { readonly where: string; readonly shown: readonly string[] } {
  const lines = linesIn(path);
  const { start, end } = lines.range(span);
  const line = lines.line(start.line);
  const last = end.line === start.line ? end.character : Math.max(line.length, start.character + 1);
  const from = start.character < widest ? 0 : start.character - 20;
  const number = String(start.line + 1);
  const cut = printable(line.slice(from, from + widest).replace(/\t/g, ' '));
  const carets = '^'.repeat(Math.max(1, Math.min(widthOf(line.slice(start.character, last)), from + widest - start.character)));
  return {
    where: `${printableWord(path)}:${start.line + 1}:${start.character + 1}`,
    shown: [`  ${number} | ${cut}`, `  ${' '.repeat(number.length)} | ${' '.repeat(widthOf(line.slice(from, start.character)))}${colour(carets)}`],
  };
}

/** Code points: near enough to columns for what board files hold. */
const widthOf = (text: string) => [...text].length;

function summaryLine({ errors, warnings, information, hints, waived, worst }: Summary, checked: readonly CheckedFile[], paint: Paint): string {
  const files = checked.length;
  const known = checked.reduce((sum, file) => sum + file.known.size, 0);
  const counts = [[errors, 'error', 'errors'], [warnings, 'warning', 'warnings'], [information, 'note', 'notes'], [hints, 'hint', 'hints'], [waived - known, 'waived', 'waived'], [known, 'in the baseline', 'in the baseline']] as const;
  const said = counts.filter(([count]) => 0 < count).map(([count, one, many]) => `${count} ${count === 1 ? one : many}`);
  const least = worst === null ? '' : ` Least margin: ${printableWord(worst.budget)}, ${worst.marginDb.toFixed(1)} dB.`;
  const findings = said.length === 0 ? `No findings in ${files === 1 ? 'this file' : `${files} files`}.` : `${said.join(', ')}.`;
  return paint.strong(findings) + least;
}
