/**
 * A picture as whoever shows it needs it: a drawing that stands by itself, and the same in words.
 *
 * The drawing has no background and follows no theme: its ink is of middle tones that read on light and on dark alike, and
 * whatever a colour says, a hatch, a dash, a shape or a word says too.
 */
export interface Picture {
  /** A whole SVG document. */
  readonly svg: string;
  /** One sentence or a few, with every number that the drawing shows; plain text. */
  readonly words: string;
  readonly width: number;
  readonly height: number;
}

/** Wide enough for axes and names, narrower than a hover. */
export const pictureWidth = 456;
