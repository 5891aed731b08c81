/** Words beside each other on as few lines as they fit: each wishes for a middle, gets the first line where it is free, or none. */
import { widthOf } from './svg';

export interface Label {
  readonly text: string;
  readonly middle: number;
}

export interface PlacedLabel extends Label {
  /** Lines count from the thing that is labelled. */
  readonly level: number;
}

export function placedLabels(labels: readonly Label[], { levels, from, to }: { readonly levels: number; readonly from: number; readonly to: number }): readonly PlacedLabel[] {
  const ends: number[] = Array.from({ length: levels }, () => -Infinity);
  return labels.flatMap(({ text, middle }) => {
    const half = widthOf(text) / 2;
    const drawn = Math.max(from + half, Math.min(to - half, middle));
    const level = ends.findIndex((end) => end + 5 <= drawn - half);
    if (level < 0) return [];
    ends[level] = drawn + half;
    return [{ text, middle: drawn, level }];
  });
}
