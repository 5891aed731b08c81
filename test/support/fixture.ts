/**
 * A board file that says what is found in it, and what its fixes make of it.
 *
 *   net RX_IN { tolerates 2 mV peak }
 *   #   ^^^^^ error[over-budget]: 5.30 mV of 2.00 mV on RX_IN: …
 *
 * Carets stand under what is underlined; `#<^^^` begins in the first column, where `#` stands, and
 * `^^^…` goes on beyond the line. `waived` before the severity marks a finding that a waiver hides.
 *
 *   # fixes of over-budget: Widen, Shorten    asks for the fixes with titles that begin so
 *   #=== over-budget: Widen the gap to …      what one of them makes of the file; `(preferred)` after it
 *   #--- common/layers.quiet                  begins another file
 *
 * A fixture is right when rendering what was really found gives the fixture back, letter for letter:
 * equality both ways. `UPDATE=1` writes the rendering; the difference is to be read.
 */
import type { Finding } from '../../server/src/rules/rule';
import { rootPath, type Texts } from './evaluated';

export interface Fixture {
  /** Without expectations. */
  readonly texts: Texts;
  readonly wantedFixes: readonly { readonly rule: string; readonly titles: readonly string[] }[];
}

export interface FixtureFix {
  readonly rule: string;
  readonly title: string;
  readonly preferred: boolean;
  /** Of every file that it changes. */
  readonly after: Texts;
}

export function readFixture(text: string): Fixture {
  const files = new Map<string, string[]>([[rootPath, []]]);
  let current = files.get(rootPath)!;
  for (const line of text.split('\n')) {
    if (line.startsWith(fixMark)) break;
    if (line.startsWith(fileMark)) files.set(line.slice(fileMark.length).trim(), (current = []));
    else if (!expectation.test(line)) current.push(line);
  }
  const texts = new Map([...files].map(([path, lines]) => [path, ended(lines.join('\n'))]));
  const [before] = text.split(`\n${fixMark}`);
  const wantedFixes = [...before!.matchAll(/^# fixes of ([a-z-]+): (.+)$/gm)].map((match) => ({ rule: match[1]!, titles: match[2]!.split(',').map((title) => title.trim()) }));
  return { texts, wantedFixes };
}

export function renderFixture({ texts }: Fixture, findings: readonly Finding[], fixes: readonly FixtureFix[] = []): string {
  const files = [...texts].map(([path, text]) => (path === rootPath ? '' : `${fileMark} ${path}\n`) + withFindings(path, text, findings));
  const results = fixes.map(({ rule, title, preferred, after }) => `${fixMark} ${rule}: ${title}${preferred ? ' (preferred)' : ''}\n${[...after].map(([path, text]) => (path === rootPath ? '' : `${fileMark} ${path}\n`) + withoutRequests(text)).join('')}`);
  return [...files, ...results].join('');
}

/** What asks for fixes is said once, at the top. */
function withoutRequests(text: string): string {
  return text.replace(/^# fixes of .*\n/gm, '');
}

const fixMark = '#===';
const fileMark = '#---';
const expectation = /^#(?:<| *)\^+…? (?:waived )?(?:error|warning|information|hint)\[[a-z-]+\]: /;

function withFindings(path: string, text: string, findings: readonly Finding[]): string {
  let offset = 0;
  return text.split('\n').map((line) => {
    const here = findings.filter(({ at }) => at.path === path && offset <= at.span.start && at.span.start <= offset + line.length);
    const marks = here.map((finding) => mark(finding, finding.at.span.start - offset, line.length));
    offset += line.length + 1;
    return [line, ...marks].join('\n');
  }).join('\n');
}

function mark({ at, waived, severity, rule, message }: Finding, column: number, width: number): string {
  const length = at.span.end - at.span.start;
  const carets = Math.max(1, Math.min(length, width - column));
  const start = column === 0 ? '#<' : `#${' '.repeat(column - 1)}`;
  return `${start}${'^'.repeat(carets)}${width < column + length ? '…' : ''} ${waived === null ? '' : 'waived '}${severity}[${rule}]: ${message}`;
}

function ended(text: string): string {
  return text.endsWith('\n') ? text : `${text}\n`;
}
