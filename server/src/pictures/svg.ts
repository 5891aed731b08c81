/**
 * The few elements that the pictures are made of, as text. Every name and word passes through `escapedForXml`; every coordinate is
 * rounded to a hundredth of a pixel, so that one input makes the same bytes on every machine.
 */
import { ink } from './ink';
import type { Picture } from './picture';

export type Attributes = Readonly<Record<string, string | number>>;

/** One line of markup per part, so that a stored picture can be read and compared. */
export function svgDocument({ width, height, words, parts }: { readonly width: number; readonly height: number; readonly words: string; readonly parts: readonly string[] }): Picture {
  const size = { width: Math.ceil(width), height: Math.ceil(height) };
  const svg = [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${size.width}" height="${size.height}" viewBox="0 0 ${size.width} ${size.height}" role="img" font-family="system-ui, 'Segoe UI', 'DejaVu Sans', sans-serif" font-size="${fontSize}">`,
    `<title>${escapedForXml(words)}</title>`,
    hatches,
    ...parts,
    '</svg>',
  ].join('\n');
  return { svg, words, ...size };
}

export const fontSize = 11.5;

/** Two directions, so that two meanings of a hatch can be told apart without colour. */
const hatches = `<defs><pattern id="over" width="5" height="5" patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><rect width="5" height="5" fill="${ink.over}" fill-opacity="0.25"/><rect width="2.4" height="5" fill="${ink.over}"/></pattern><pattern id="barred" width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(-45)"><rect width="1" height="7" fill="${ink.text}" fill-opacity="0.6"/></pattern></defs>`;

export function element(name: string, attributes: Attributes, content: string | null = null): string {
  const given = Object.entries(attributes).map(([key, value]) => ` ${key}="${typeof value === 'number' ? coordinate(value) : escapedForXml(value)}"`).join('');
  return content === null ? `<${name}${given}/>` : `<${name}${given}>${content}</${name}>`;
}

/** `at`: the baseline's beginning, middle or end. */
export function words(text: string, at: { readonly x: number; readonly y: number }, attributes: Attributes = {}): string {
  return element('text', { x: at.x, y: at.y, fill: ink.text, ...attributes }, escapedForXml(text));
}

export function line(from: readonly [number, number], to: readonly [number, number], attributes: Attributes = {}): string {
  return element('line', { x1: from[0], y1: from[1], x2: to[0], y2: to[1], stroke: ink.text, ...attributes });
}

export function polyline(points: readonly (readonly [number, number])[], attributes: Attributes): string {
  return element('polyline', { points: pointsInText(points), fill: 'none', ...attributes });
}

export function polygon(points: readonly (readonly [number, number])[], attributes: Attributes): string {
  return element('polygon', { points: pointsInText(points), ...attributes });
}

function pointsInText(points: readonly (readonly [number, number])[]): string {
  return points.map(([x, y]) => `${coordinate(x)},${coordinate(y)}`).join(' ');
}

/** What cannot be drawn stands at the edge of the picture rather than make it unreadable to every viewer. */
function coordinate(value: number): string {
  if (!Number.isFinite(value)) return '0';
  const text = Math.max(-1e5, Math.min(1e5, value)).toFixed(2).replace(/\.?0+$/, '');
  return text === '-0' ? '0' : text;
}

export function escapedForXml(text: string): string {
  return text.replace(notShown, '\ufffd').replace(/[&<>"']/g, (character) => entities[character] as string);
}

const entities: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&apos;' };

/** What XML 1.0 forbids, lone surrogates among it, control characters, and those that turn the direction of what follows. */
const notShown = /[^\t\n\r\u0020-\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]|[\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]/gu;

/** A name that leaves room for others; whole in the words beside the picture. */
export function shortened(name: string, longest: number): string {
  const characters = [...name];
  return characters.length <= longest ? name : `${characters.slice(0, longest - 1).join('')}…`;
}

/** About how wide a text is drawn; no font is at hand to ask, so rather too wide. */
export function widthOf(text: string): number {
  return 0.58 * fontSize * [...text].length;
}
