/** Whether a hover shows pictures, and how long it may work for one that has to be computed first. */
import type { Picture } from '../../pictures/picture';
import { pictureInMarkdown } from './pictureInMarkdown';

export interface Pictures {
  /** Milliseconds; null where none are shown. What is not done by then is for the next hover. */
  readonly patience: number | null;
  /** Takes what was not done; each call does a piece of it, and answers whether anything is left. */
  readonly later?: (step: () => boolean) => void;
}

export const noPictures: Pictures = { patience: null };

/** Markdown; null where no pictures are shown, or there is nothing to draw. */
export function drawn({ patience }: Pictures, make: (patience: number) => Picture | null): string | null {
  if (patience === null) return null;
  const picture = make(patience);
  return picture === null ? null : pictureInMarkdown(picture);
}
