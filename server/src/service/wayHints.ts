/**
 * What stands in grey in loops, returns and links: how large they are, and what each name in them receives by them or puts on
 * whom, as a share of what is tolerated.
 */
import type { Loop, Link, Net, Pair, Place, SharedReturn } from '../board/model';
import type { Heard } from '../budget/heard';
import type { Evaluation, LoopResult, ReturnResult } from '../budget/results';
import { totalOf } from '../budget/totals';
import { receiverInText, voltageInText } from '../rules/budgetFault';
import type { SourceTree } from '../syntax/tree';
import { inText } from '../units/inText';
import type { Hint } from './answers';
import { escaped, paragraphs, percent } from './hover/markdown';

export interface Placed {
  readonly place: Place;
  readonly hint: Hint;
}

export function wayHints(evaluation: Evaluation, isInSight: (whole: Place) => boolean, treeOf: (path: string) => SourceTree | undefined): readonly Placed[] {
  const shown = <Way extends { readonly whole: Place }>(ways: readonly Way[]) => ways.filter(({ whole }) => isInSight(whole));
  const { project: { loops, returns, links } } = evaluation;
  const inSight = { loops: shown(loops), returns: shown(returns), links: shown(links) };
  return [
    ...evaluation.loops.filter(({ loop }) => inSight.loops.includes(loop)).flatMap(loopSize),
    ...evaluation.returns.filter(({ shared }) => inSight.returns.includes(shared)).flatMap(returnSize),
    ...inSight.loops.flatMap((loop) => loopNoise(evaluation, loop)),
    ...inSight.returns.flatMap((shared) => returnNoise(evaluation, shared)),
    ...inSight.links.flatMap((link) => linkNoise(evaluation, link, treeOf(link.whole.path))),
  ];
}

function loopSize({ loop: { name, shape, areaLimit, inductanceLimit }, area, perimeter, inductance }: LoopResult): readonly Placed[] {
  if (shape === null || area === null || perimeter === null) return [];
  const sizes = [{ what: 'area', value: area, limit: areaLimit }, { what: 'inductance', value: inductance, limit: inductanceLimit }] as const;
  const parts = sizes.flatMap(({ what, value, limit }) => (value === null ? [] : [{ text: inText(value, what), target: limit?.place ?? null }]));
  const limits = sizes.flatMap(({ what, value, limit }) => (value === null || limit === null ? [] : [`- ${inText(value, what)} of ${inText(limit.value, what)} at most, ${percent(value / limit.value)}`]));
  const tooltip = paragraphs(`Loop **${escaped(name)}** encloses ${inText(area, 'area')}, ${inText(perimeter, 'length')} around${inductance === null ? '; without `strip` or `wire` it has no inductance' : ''}.`, limits.join('\n'));
  return [sized(shape.place, parts, tooltip)];
}

function returnSize({ shared: { name, place }, resistance, inductance }: ReturnResult): readonly Placed[] {
  const [drop, reactance] = [inText(resistance, 'resistance'), inText(inductance, 'inductance')];
  return [sized(place, [drop, reactance].map((text) => ({ text, target: null })), `Each ampere through return **${escaped(name)}** drops ${inText(resistance, 'voltage')}, and each ampere in a nanosecond ${inText(inductance * 1e9, 'voltage')}.`)];
}

function sized(place: Place, parts: Hint['parts'], tooltip: string): Placed {
  return { place, hint: { kind: 'size', offset: place.span.end, parts: parts.map((part, at) => (at === 0 ? part : { ...part, text: ` · ${part.text}` })), tooltip } };
}

function loopNoise(evaluation: Evaluation, loop: Loop): readonly Placed[] {
  const through = evaluation.heard.filter(({ channel, origins }) => channel === 'loop' && origins.includes(loop.name));
  const into = (signal: Net | Pair) => ({ heard: evaluation.heard.filter(({ channel, receiver }) => channel === 'loop' && reads(receiver, signal)), field: loop.name });
  return oncePlaced([
    ...loop.senses.flatMap(({ signal, place }) => noiseAt(evaluation, place, into(signal), 'into its loops')),
    ...loop.carries.flatMap(({ net, place }) => noiseAt(evaluation, place, { heard: through.filter(({ source }) => moves(source, net)) }, `by loop ${escaped(loop.name)}`, 'named')),
  ]);
}

function returnNoise(evaluation: Evaluation, { place, refers, carries, name }: SharedReturn): readonly Placed[] {
  const through = evaluation.heard.filter((each) => each.channel === 'shared return' && each.place === place);
  const where = `over return ${escaped(name)}`;
  return oncePlaced([
    ...refers.flatMap(({ signal, place: at }) => noiseAt(evaluation, at, { heard: through.filter(({ receiver }) => reads(receiver, signal)) }, where)),
    ...carries.flatMap(({ net, place: at }) => noiseAt(evaluation, at, { heard: through.filter(({ source }) => moves(source, net)) }, where, 'named')),
  ]);
}

function linkNoise(evaluation: Evaluation, { name, whole }: Link, tree: SourceTree | undefined): readonly Placed[] {
  const between = tree?.statements.find(({ span }) => span.start === whole.span.start)?.block?.statements.find(({ keyword }) => keyword === 'between');
  if (between === undefined) return [];
  const heard = evaluation.heard.filter(({ channel, origins }) => channel === 'link' && origins.includes(name));
  return noiseAt(evaluation, { path: whole.path, span: between.span }, { heard }, `by link ${escaped(name)}`, 'named');
}

function reads({ subject, terms }: Heard['receiver'], signal: Net | Pair): boolean {
  return subject === signal || terms.some(({ net }) => net === signal);
}

function moves(source: Heard['source'], net: Net): boolean {
  return source.moves.some((move) => move.net === net);
}

interface Brought {
  readonly heard: readonly Heard[];
  /** What fields from outside put on it in a loop of this name counts as well. */
  readonly field?: string;
}

/** On the receiver that it takes the largest share of; `named`: which one is not plain from where it stands. */
function noiseAt({ budgets }: Evaluation, place: Place, brought: Brought, way: string, named?: 'named'): readonly Placed[] {
  const known = keysOf(brought.heard);
  const all = budgets.flatMap((budget) => {
    const keys = known.get(budget.subject);
    if (keys === undefined && brought.field === undefined) return [];
    const here = budget.contributions.filter(({ channel, from, where }) => (channel === 'radiated' ? where === brought.field : keys?.has(keyOf(budget.kind, channel, from, where))));
    if (here.length === 0) return [];
    const { total } = totalOf(here, budget.combine);
    return [{ budget, here, total, share: total / budget.tolerates }];
  });
  if (all.length === 0) return [];
  const { budget, here, total, share } = all.reduce((worst, other) => (worst.share < other.share ? other : worst));
  const whom = receiverInText(budget);
  const tooltip = paragraphs(
    `${voltageInText(total, budget)} on **${escaped(whom)}** ${way}, ${percent(share)} of the ${voltageInText(budget.tolerates, budget)} that it tolerates.`,
    here.slice(0, 6).map(({ from, value }) => `- ${voltageInText(value, budget)} from ${escaped(from ?? '')}`).join('\n'),
    budget.total !== null && `${voltageInText(budget.total, budget)} over all its ways${budget.complete ? '' : ', and something is not counted'}.`,
    1 < all.length && `The worst of ${all.length} budgets that it reaches.`,
  );
  const amount = `≈ ${voltageInText(total, budget)}${named === undefined ? '' : ` on ${whom}`}`;
  return [{ place, hint: { kind: 'noise', offset: place.span.end, parts: [{ text: amount, target: budget.subject.place }, { text: ` · ${percent(share)}`, target: budget.toleratesPlace }], tooltip } }];
}

/** A budget holds many contributions, and a board many ways: each is found by what it says, not by comparing all with all. */
function keysOf(heard: readonly Heard[]): ReadonlyMap<Net | Pair, ReadonlySet<string>> {
  const keys = new Map<Net | Pair, Set<string>>();
  for (const { channel, source, origins, receiver: { subject, kind } } of heard) {
    const known = keys.get(subject) ?? new Set<string>();
    keys.set(subject, known.add(keyOf(kind, channel, source.signal.name, origins.join(', '))));
  }
  return keys;
}

function keyOf(...parts: readonly (string | null)[]): string {
  return JSON.stringify(parts);
}

/** Of the names of one range, the first: they stand at one place. */
function oncePlaced(hints: readonly Placed[]): readonly Placed[] {
  return hints.filter(({ place }, at) => hints.findIndex((other) => other.place.span.end === place.span.end && other.place.path === place.path) === at);
}
