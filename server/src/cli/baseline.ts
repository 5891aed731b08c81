/**
 * A baseline: findings that were there when the check was adopted, and do not fail it. They are known by rule and names, not by
 * line, so that a file may be moved, formatted and added to; one that has become worse is a finding again.
 */
import path from 'node:path';
import { z } from 'zod';
import type { Finding } from '../rules/rule';
import { isRuleName, isWaivable } from '../rules/ruleNames';
import type { CheckedFile } from './checkedFiles';

const entrySchema = z.strictObject({
  file: z.string().describe('Relative to the folder of the baseline, with `/`.'),
  key: z.string().describe('Rule and names.'),
  value: z.number().nullable().describe('What was compared, SI; null where nothing was.'),
});

export const baselineSchema = z.strictObject({ version: z.literal(1), findings: z.array(entrySchema) });

export type Baseline = z.infer<typeof baselineSchema>;
type Entry = Baseline['findings'][number];

/** Null where the text is no baseline. */
export function readBaseline(text: string): Baseline | null {
  try {
    return baselineSchema.safeParse(JSON.parse(text)).data ?? null;
  } catch {
    return null;
  }
}

/** As it is written: sorted, one finding a line, so that a change of one is a change of one line. */
export function baselineText({ findings }: Baseline): string {
  const sorted = [...findings].sort((a, b) => compare(a.file, b.file) || compare(a.key, b.key) || (a.value ?? 0) - (b.value ?? 0));
  return `{\n  "version": 1,\n  "findings": [${sorted.map((entry) => `\n    ${JSON.stringify(entry)}`).join(',')}${sorted.length === 0 ? '' : '\n  '}]\n}\n`;
}

/** Where the baseline is and where the paths of what was checked begin. */
export interface BaselinePlace {
  readonly baselineFile: string;
  readonly workingDirectory: string;
}

/** Every finding that could fail a check. What cannot be read is not for a baseline: nobody knows what it hides. */
export function baselineOf(checked: readonly CheckedFile[], place: BaselinePlace): Baseline {
  return { version: 1, findings: checked.flatMap((file) => file.analysis.findings.filter(mayBeKnown).map((finding) => entryOf(file, finding, place))) };
}

export interface Compared {
  /** As `checked`, each with the findings that the baseline knows. */
  readonly checked: readonly CheckedFile[];
  /** Entries of the checked files that nothing answers to any more. */
  readonly gone: number;
}

export function comparedWith(baseline: Baseline, checked: readonly CheckedFile[], place: BaselinePlace): Compared {
  const left = new Map<string, Entry[]>();
  for (const entry of baseline.findings) left.set(identity(entry), [...(left.get(identity(entry)) ?? []), entry]);
  const compared = checked.map((file) => {
    const known = new Set(file.analysis.findings.filter((finding) => {
      if (!mayBeKnown(finding)) return false;
      const entries = left.get(identity(entryOf(file, finding, place))) ?? [];
      const at = entries.findIndex((entry) => !isWorse(finding, entry));
      return 0 <= at && 0 < entries.splice(at, 1).length;
    }));
    return { ...file, known };
  });
  const files = new Set(checked.map((file) => inFolderOf(place, file.path)));
  return { checked: compared, gone: [...left.values()].flat().filter(({ file }) => files.has(file)).length };
}

function mayBeKnown({ rule, severity, waived }: Finding): boolean {
  return waived === null && (severity === 'error' || severity === 'warning') && isRuleName(rule) && isWaivable(rule);
}

/** Of the limit. Less is the rounding of another version of the models, not a change of the board. */
const tolerated = 0.01;
const largerIsWorse: ReadonlySet<string> = new Set(['over-budget', 'low-margin', 'loop-too-large', 'emission-over-limit']);

function isWorse({ rule, value, limit }: Finding, entry: Entry): boolean {
  if (value === null || entry.value === null || limit === null) return false;
  const worsened = largerIsWorse.has(rule) ? value - entry.value : entry.value - value;
  return tolerated * Math.abs(limit) < worsened;
}

/** Six figures: no last digit of another machine changes the file. */
const entryOf = (file: CheckedFile, { key, value }: Finding, place: BaselinePlace): Entry => ({ file: inFolderOf(place, file.path), key, value: value !== null && Number.isFinite(value) ? Number(value.toPrecision(6)) : null });

const identity = ({ file, key }: Pick<Entry, 'file' | 'key'>) => JSON.stringify([file, key]);

function inFolderOf({ baselineFile, workingDirectory }: BaselinePlace, file: string): string {
  return path.relative(path.dirname(path.resolve(workingDirectory, baselineFile)), path.resolve(workingDirectory, file)).split(path.sep).join('/');
}

const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0);
