/** A loop, a shared return or a link: its own numbers, and what it brings to whom. */
import type { Loop, NameRecord, SharedReturn, Link } from '../../board/model';
import type { Evaluation, LoopResult, ReturnResult } from '../../budget/results';
import type { Heard } from '../../budget/heard';
import { budgetOfHeard } from '../../rules/budgetOfHeard';
import { receiverInText, voltageInText } from '../../rules/budgetFault';
import { inText } from '../../units/inText';
import { escaped, escapedLines, paragraphs, percent, table } from './markdown';

export function wayHover(evaluation: Evaluation, { kind, name }: NameRecord): string | null {
  switch (kind) {
    case 'loop': {
      const found = evaluation.loops.find(({ loop }) => loop.name === name);
      return found === undefined ? null : wayInWords(evaluation, found.loop, 'loop', loopInWords(found));
    }
    case 'return': {
      const found = evaluation.returns.find(({ shared }) => shared.name === name);
      return found === undefined ? null : wayInWords(evaluation, found.shared, 'return', returnInWords(found));
    }
    case 'link': {
      const found = evaluation.project.links.find((link) => link.name === name);
      return found === undefined ? null : wayInWords(evaluation, found, 'link', linkInWords(found));
    }
    default: return null;
  }
}

const channels = { loop: 'loop', return: 'shared return', link: 'link' } as const;

function wayInWords(evaluation: Evaluation, declared: Loop | SharedReturn | Link, kind: keyof typeof channels, numbers: readonly (string | null)[]): string {
  const { heard } = evaluation;
  const through = heard.filter(({ channel, origins }) => channel === channels[kind] && origins.includes(declared.name));
  const sensed = kind === 'loop' ? heard.filter(({ channel, receiver }) => channel === 'loop' && (declared as Loop).senses.some(({ signal }) => signal === receiver.subject || receiver.terms.some(({ net }) => net === signal))) : [];
  const all = [...new Set([...through, ...sensed])];
  return paragraphs(
    declared.documentation === null ? null : escapedLines(declared.documentation),
    `**${kind} ${escaped(declared.name)}**: ${numbers[0] ?? ''}`,
    ...numbers.slice(1),
    all.length === 0 ? 'It brings no noise to anyone that is stated.' : broughtTable(evaluation, all),
    assumptionsInWords(all),
  );
}

const rowsShown = 12;

function broughtTable(evaluation: Evaluation, heard: readonly Heard[]): string {
  const rows = heard.flatMap((each) => budgetOfHeard(evaluation, each).map(({ budget, value }) => ({ each, budget, value, share: value / budget.tolerates }))).sort((a, b) => b.share - a.share);
  const words = table(['from → to', 'noise', 'of what it tolerates'], rows.slice(0, rowsShown).map(({ each, budget, value, share }) => [`${escaped(each.source.signal.name)} → ${escaped(receiverInText(budget))}`, `**${voltageInText(value, budget)}**`, percent(share)]));
  return `${words}${rows.length <= rowsShown ? '' : `\n\nand ${rows.length - rowsShown} smaller ones`}`;
}

function assumptionsInWords(heard: readonly Heard[]): string | null {
  const said = [...new Set(heard.flatMap(({ edge, sines, spectrum }) => [edge, spectrum, ...sines].flatMap((part) => part?.assumptions ?? [])))];
  return said.length === 0 ? null : `It rests on:\n\n${said.slice(0, 6).map((words) => `- ${escaped(words)}`).join('\n')}`;
}

function loopInWords({ loop, area, perimeter, inductance, inductanceError, mutual }: LoopResult): readonly (string | null)[] {
  const size = area === null || perimeter === null ? 'its path is none that a current can take' : `${inText(area, 'area')}, ${inText(perimeter, 'length')} around`;
  const own = inductance === null ? 'no inductance without `strip` or `wire`' : `${inText(inductance, 'inductance')}${inductanceError === null || inductanceError < 5e-4 * inductance ? '' : ` ± ${inText(inductanceError, 'inductance')}`}`;
  const limits = [...(loop.areaLimit === null ? [] : [`${inText(loop.areaLimit.value, 'area')} at most`]), ...(loop.inductanceLimit === null ? [] : [`${inText(loop.inductanceLimit.value, 'inductance')} at most`])];
  const near = [...mutual].sort((a, b) => Math.abs(b.inductance) - Math.abs(a.inductance)).slice(0, 3).map(({ other, inductance: with_ }) => `${inText(with_, 'inductance')} with ${escaped(other.name)}`);
  return [`${size}, ${own}`, limits.length === 0 ? null : `Its limits: ${limits.join(', ')}.`, near.length === 0 ? null : `Mutual inductance: ${near.join(', ')}.`];
}

function returnInWords({ resistance, inductance, errorBar, assumptions }: ReturnResult): readonly (string | null)[] {
  return [`${inText(resistance, 'resistance')} at dc, ${inText(inductance, 'inductance')}${errorBar < 5e-4 ? '' : `, known to ${inText(errorBar, 'fraction')}`}`, assumptions.length === 0 ? null : assumptions.map((words) => `- ${escaped(words)}`).join('\n')];
}

function linkInWords({ from, to, capacitance, mutual }: Link): readonly string[] {
  const values = [...(capacitance === null ? [] : [inText(capacitance.value, 'capacitance')]), ...(mutual === null ? [] : [`${inText(mutual.value, 'inductance')} mutual`])];
  return [`${values.join(' and ')} between the load ends of ${escaped(from.name)} and ${escaped(to.name)}`];
}
