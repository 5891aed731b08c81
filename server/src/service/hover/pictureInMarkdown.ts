/**
 * Pictures in a hover: as images of which the address is the drawing, since nothing else is shown without trust and without HTML. The
 * words stand in for an image that is not seen, and for one that there is no room for.
 */
import { base64 } from '../../pictures/base64';
import type { Picture } from '../../pictures/picture';
import { escaped } from './markdown';

export function pictureInMarkdown({ svg, words }: Picture): string {
  return `![${escaped(words)}](data:image/svg+xml;base64,${base64(svg)})`;
}

/** An editor cuts off what is longer than 100 000 characters, in the middle of a picture if need be: the last ones become words first. */
export function withinSize(markdown: string, most: number = longestHover): string {
  let text = markdown;
  while (most < text.length) {
    const last = [...text.matchAll(image)].at(-1);
    if (last === undefined) return text;
    text = `${text.slice(0, last.index)}*${last[1]}*${text.slice(last.index + last[0].length)}`;
  }
  return text;
}

export const longestHover = 90_000;

/** No name can look like one: its brackets and its exclamation marks are escaped. */
const image = /!\[((?:\\.|[^\]\\])*)\]\(data:image\/svg\+xml;base64,[A-Za-z0-9+/=]*\)/g;
