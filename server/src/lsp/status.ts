/** Tells a client that shows it the worst margin among the projects of a file. */
import type { Budget } from '../budget/results';
import { statusMethod, type StatusParams } from './messages';
import type { Server } from './server';

export function sendStatus({ connection, documents }: Server, path: string): void {
  const budgets = documents.session.projectsOf(path).flatMap((root) => documents.session.analyse(root).evaluation.budgets);
  const params: StatusParams = { uri: documents.paths.uriOf(path), worst: worstOf(budgets), incomplete: budgets.filter(({ complete }) => !complete).length };
  void connection.sendNotification(statusMethod, params);
}

function worstOf(budgets: readonly Budget[]): StatusParams['worst'] {
  let worst: StatusParams['worst'] = null;
  for (const { subject, marginDb } of budgets) {
    if (marginDb !== null && (worst === null || marginDb < worst.marginDb)) worst = { receiver: subject.name, marginDb };
  }
  return worst;
}
