/** What one net of a run puts on another, over time, for whoever shows pictures. */
import type { Coupling, Evaluation } from '../../budget/results';
import type { Picture } from '../../pictures/picture';
import { waveforms } from '../../pictures/waveforms';

/** Null of a sine, which has no course of its own. */
export function couplingPicture({ budgets }: Evaluation, coupling: Coupling): Picture | null {
  const { aggressor, victim, kind, waveform, endWaveforms } = coupling;
  if (waveform === null || endWaveforms === null) return null;
  const budget = budgets.find(({ subject, kind: read, measure }) => subject === victim && read === kind && measure === 'peak');
  const { near, far, until } = endWaveforms;
  const samples = victim.samples !== null && victim.samples.group === aggressor.switchesWith ? victim.samples : null;
  return waveforms({
    from: aggressor.name,
    to: victim.name,
    curves: [{ where: 'receiver', ...waveform }, { where: 'near end', ...near }, { where: 'far end', ...far }],
    tolerates: budget?.tolerates ?? null,
    countedFrom: samples?.delay.value ?? null,
    until,
  });
}
