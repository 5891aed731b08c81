/** The loops behind what a receiver hears by loops: those that carry the current, then those in which it induces; or the one around which a field does. */
import type { Loop } from '../board/model';
import type { Budget, Contribution } from '../budget/results';
import { insulationMatters } from '../rules/touchLimits';
import type { FixContext } from './fix';

export function loopsBehind({ project, evaluation }: FixContext, { subject, kind }: Budget, { channel, from, place }: Contribution): readonly Loop[] {
  if (channel === 'radiated') return project.loops.filter((loop) => loop.place === place);
  if (channel !== 'loop') return [];
  const heard = evaluation.heard.find((each) => each.channel === 'loop' && each.source.signal.name === from && each.receiver.subject === subject && each.receiver.kind === kind);
  if (heard === undefined) return [];
  const carrying = project.loops.filter(({ name }) => heard.origins.includes(name));
  const sensing = project.loops.filter(({ senses }) => senses.some(({ signal }) => signal === subject || heard.receiver.terms.some(({ net }) => net === signal)));
  return [...new Set([...carrying, ...sensing])];
}

/** Insulation depends on it: no fix brings its own conductors, or copper, nearer to it. */
export function isUnderVoltage({ project }: Pick<FixContext, 'project'>, { carries, senses }: Loop): boolean {
  const nets = [...carries.map(({ net }) => net), ...senses.flatMap(({ signal }) => (signal.kind === 'net' ? [signal] : [signal.plus, signal.minus].filter((net) => net !== null)))];
  return nets.some((net) => insulationMatters(net, project));
}
