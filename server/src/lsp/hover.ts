import { MarkupKind, type Hover } from 'vscode-languageserver';
import { hover, hoverWithPictures } from '../service/hover';
import { rangeOf } from './positions';
import type { Server } from './server';

export function answerHover({ connection, guard, documents }: Server, showsPictures: () => boolean): void {
  const rest = inTheBackground((error) => connection.console.error(`a picture for a hover: ${String(error)}`));
  documents.onEdit(() => rest.drop());
  connection.onHover(guard('hover', null, async ({ textDocument, position }): Promise<Hover | null> => {
    const file = await documents.at(textDocument.uri);
    if (file === null) return null;
    const offset = file.document.offsetAt(position);
    rest.drop();
    const until = Date.now() + patience;
    const answer = showsPictures() ? hoverWithPictures(documents.session, file.path, { offset, pictures: { until, later: rest.add } }) : hover(documents.session, file.path, offset);
    if (answer === null) return null;
    return { contents: { kind: MarkupKind.Markdown, value: answer.markdown }, range: rangeOf(file.document, answer.span) };
  }));
}

/** Milliseconds, from its beginning, after which a hover begins no more work for a picture. */
const patience = 40;

interface Background {
  readonly add: (step: () => boolean) => void;
  /** For a text that has changed, or a hover that nobody looks at any more. */
  readonly drop: () => void;
}

/** A picture that a hover did not wait for is finished after it, for the next one, between the requests that come meanwhile. */
function inTheBackground(log: (error: unknown) => void): Background {
  let steps: (() => boolean)[] = [];
  let due: ReturnType<typeof setTimeout> | null = null;
  const next = () => {
    due = null;
    try {
      while (0 < steps.length && !steps[0]()) steps.shift();
    } catch (error) {
      steps = [];
      log(error);
    }
    if (0 < steps.length) due ??= setTimeout(next, pause);
  };
  return {
    add: (step) => {
      steps.push(step);
      due ??= setTimeout(next, pause);
    },
    drop: () => {
      steps = [];
      if (due !== null) clearTimeout(due);
      due = null;
    },
  };
}

/** Milliseconds, in which requests are answered. */
const pause = 5;
