/** The bars of a budget, for whoever shows pictures. */
import type { Project } from '../../board/model';
import type { Budget, Contribution } from '../../budget/results';
import { budgetBars } from '../../pictures/budgetBars';
import type { Picture } from '../../pictures/picture';
import { receiverInText, shareOf } from '../../rules/budgetFault';

/** Null where there is nothing to draw. */
export function budgetPicture({ board }: Project, budget: Budget): Picture | null {
  const { contributions, tolerates, measure, combine, total } = budget;
  if (contributions.length === 0) return null;
  const headroom = board.headroom?.value ?? 0;
  return budgetBars({
    receiver: receiverInText(budget),
    measure,
    tolerates,
    wanted: headroom === 0 ? null : tolerates / 10 ** (headroom / 20),
    total,
    parts: contributions.map((contribution) => ({ name: nameOf(contribution), value: contribution.value, share: shareOf(contribution, budget) })),
    sum: measure === 'rms' || combine === 'rss' ? 'squares' : 'adds',
  });
}

/** Short enough to stand beside a bar. */
function nameOf({ from, channel, where }: Contribution): string {
  if (from === null) return `own ${channel} noise`;
  return channel === 'coupled' || where === null ? from : `${from}, ${channel}`;
}
