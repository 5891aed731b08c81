/** A loop, a shared return, a link, a shield or a field: its own numbers, and what it brings to whom. */
import type { Ambient, Loop, NameRecord, SharedReturn, Link } from '../../board/model';
import type { Evaluation, LoopResult, ReturnResult, ShieldResult } from '../../budget/results';
import type { Heard } from '../../budget/heard';
import { budgetOfHeard } from '../../rules/budgetOfHeard';
import { receiverInText, voltageInText } from '../../rules/budgetFault';
import { levelInText } from '../../rules/emissionOverLimit';
import { errorInText, inText } from '../../units/inText';
import { currentInWords } from './netHover';
import { loopPicture } from '../pictures/loopPicture';
import { escaped, escapedLines, paragraphs, percent, table } from './markdown';
import { drawn, type Pictures } from './pictures';

export function wayHover(evaluation: Evaluation, { kind, name }: NameRecord, pictures: Pictures): string | null {
  switch (kind) {
    case 'loop': {
      const found = evaluation.loops.find(({ loop }) => loop.name === name);
      return found === undefined ? null : wayInWords(evaluation, found.loop, 'loop', loopInWords(evaluation, found, pictures));
    }
    case 'return': {
      const found = evaluation.returns.find(({ shared }) => shared.name === name);
      return found === undefined ? null : wayInWords(evaluation, found.shared, 'return', returnInWords(found));
    }
    case 'link': {
      const found = evaluation.project.links.find((link) => link.name === name);
      return found === undefined ? null : wayInWords(evaluation, found, 'link', linkInWords(found));
    }
    case 'shield': {
      const found = evaluation.shields.find(({ shield }) => shield.name === name);
      return found === undefined ? null : shieldHover(found);
    }
    case 'ambient': {
      const found = evaluation.project.ambients.find((ambient) => ambient.name === name);
      return found === undefined ? null : fieldHover(evaluation, found);
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

function loopInWords(evaluation: Evaluation, result: LoopResult, pictures: Pictures): readonly (string | null)[] {
  const { loop, area, perimeter, inductance, inductanceError, emission, mutual } = result;
  const size = area === null || perimeter === null ? 'its path is none that a current can take' : `${inText(area, 'area')}, ${inText(perimeter, 'length')} around`;
  const own = inductance === null ? 'no inductance without `strip` or `wire`' : `${inText(inductance, 'inductance')}${inductanceError === null || inductanceError < 5e-4 * inductance ? '' : ` ${errorInText(inductanceError, inductance, 'inductance')}`}`;
  const limits = [...(loop.areaLimit === null ? [] : [`${inText(loop.areaLimit.value, 'area')} at most`]), ...(loop.inductanceLimit === null ? [] : [`${inText(loop.inductanceLimit.value, 'inductance')} at most`])];
  const near = [...mutual].sort((a, b) => Math.abs(b.inductance) - Math.abs(a.inductance)).slice(0, 3).map(({ other, inductance: with_ }) => `${inText(with_, 'inductance')} with ${escaped(other.name)}`);
  return [`${size}, ${own}`, drawn(pictures, () => loopPicture(evaluation, result)), loopUseInWords(loop), limits.length === 0 ? null : `Its limits: ${limits.join(', ')}.`, near.length === 0 ? null : `Mutual inductance: ${near.join(', ')}.`, emission.length === 0 ? null : emissionInWords(emission)];
}

/** Whose current it is, and how large where somebody states it. */
function loopUseInWords({ carries, senses }: Loop): string | null {
  const carried = carries.map(({ net, current }) => {
    const stated = current ?? net.current;
    return `${escaped(net.name)} (${stated === null ? 'what its circuit draws' : currentInWords(stated)})`;
  });
  const uses = [...(carried.length === 0 ? [] : [`carries the current of ${carried.join(', ')}`]), ...(senses.length === 0 ? [] : [`lies in the way of ${senses.map(({ signal }) => escaped(signal.name)).join(', ')}`])];
  return uses.length === 0 ? null : `It ${uses.join(', and ')}.`;
}

function emissionInWords(emission: LoopResult['emission']): string {
  const rows = emission.map(({ limit, frequency, field, marginDb }) => [`${inText(limit.distance.value, 'length')}, ${inText(limit.from.value, 'frequency')} to ${inText(limit.to.value, 'frequency')}`, `**${levelInText(field)}** at ${inText(frequency, 'frequency')}`, levelInText(limit.field.value), marginDb === null ? '' : inText(marginDb, 'level')]);
  return `${table(['it emits at', 'at worst', 'limit', 'margin'], rows)}\n\nCurrents on attached cables are not included and often dominate; this does not predict a test result.`;
}

function shieldHover({ shield, frequency, effectivenessDb }: ShieldResult): string {
  const does = frequency === null || effectivenessDb === null ? 'nothing on the board moves, so there is no frequency to judge it at' : `${inText(effectivenessDb, 'level')} against a plane wave at ${inText(frequency, 'frequency')}, the highest of its board`;
  const of = [...(shield.sheet === null ? ['no sheet stated'] : [`${inText(shield.sheet.thickness.value, 'length')} of ${shield.sheet.material}`]), ...(shield.slot === null ? [] : [`its longest opening ${inText(shield.slot.value, 'length')}`]), shield.grounded === true ? 'grounded' : 'floating'];
  return paragraphs(
    shield.documentation === null ? null : escapedLines(shield.documentation),
    `**shield ${escaped(shield.name)}**: ${does}`,
    `${of.join(', ')}. Over ${shield.covers.map(({ subject }) => escaped(subject.name)).join(', ')}.`,
    'It acts on fields from outside, on what loops under it emit, and between a loop under it and one that is not; never on runs, links or returns.',
  );
}

function fieldHover(evaluation: Evaluation, ambient: Ambient): string {
  const rows = evaluation.budgets.flatMap((budget) => budget.contributions.filter(({ channel, from }) => channel === 'radiated' && from === ambient.name).map((contribution) => ({ budget, contribution, share: contribution.value / budget.tolerates }))).sort((a, b) => b.share - a.share);
  const crest = ambient.modulated === null ? '' : `, modulated to ${inText(1 + ambient.modulated.value, 'fraction')} of it`;
  return paragraphs(
    ambient.documentation === null ? null : escapedLines(ambient.documentation),
    `**ambient ${escaped(ambient.name)}**: ${inText(ambient.field.value, 'field')} from ${inText(ambient.from.value, 'frequency')} to ${inText(ambient.to.value, 'frequency')}, rms${crest}`,
    rows.length === 0 ? 'It reaches no receiver: none has a loop, or a trace beside one plane.' : table(['around → to', 'noise', 'of what it tolerates'], rows.slice(0, rowsShown).map(({ budget, contribution, share }) => [`${escaped(contribution.where ?? '')} → ${escaped(receiverInText(budget))}`, `**${voltageInText(contribution.value, budget)}**`, percent(share)])),
  );
}

function returnInWords({ shared: { carries, refers }, resistance, inductance, errorBar, assumptions }: ReturnResult): readonly (string | null)[] {
  const names = (all: readonly string[]) => all.map(escaped).join(', ');
  const uses = [...(carries.length === 0 ? [] : [`carries ${names(carries.map(({ net }) => net.name))}`]), ...(refers.length === 0 ? [] : [`is what ${names(refers.map(({ signal }) => signal.name))} measures against`])];
  return [`${inText(resistance, 'resistance')} at dc, ${inText(inductance, 'inductance')}${errorBar < 5e-4 ? '' : `, known to ${inText(errorBar, 'fraction')}`}`, uses.length === 0 ? null : `It ${uses.join(', and ')}.`, assumptions.length === 0 ? null : assumptions.map((words) => `- ${escaped(words)}`).join('\n')];
}

function linkInWords({ from, to, capacitance, mutual }: Link): readonly string[] {
  const values = [...(capacitance === null ? [] : [inText(capacitance.value, 'capacitance')]), ...(mutual === null ? [] : [`${inText(mutual.value, 'inductance')} mutual`])];
  return [`${values.join(' and ')} between the load ends of ${escaped(from.name)} and ${escaped(to.name)}`];
}
