/** Whether a hover shows pictures, and until when it may work for one that has to be computed first. */
import type { Picture } from '../../pictures/picture';
import { pictureInMarkdown } from './pictureInMarkdown';

export interface Pictures {
  /** As `Date.now` counts; null where none are shown. What is not done by then is for the next hover. */
  readonly until: number | null;
  /** Takes what was not done; each call does a piece of it, and answers whether anything is left. */
  readonly later?: (step: () => boolean) => void;
}

export const noPictures: Pictures = { until: null };

/** Markdown; null where no pictures are shown, or there is nothing to draw. */
export function drawn({ until }: Pictures, make: () => Picture | null): string | null {
  if (until === null) return null;
  const picture = make();
  return picture === null ? null : pictureInMarkdown(picture);
}
