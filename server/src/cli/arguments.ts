/** The words of the command line, read into a command; what does not fit is one sentence. */
import { metres, type Length } from '../units/quantity';
import { unitSpelt } from '../units/spelling';
import { readOptions, type Options } from './options';

export type Command =
  | CheckCommand
  | FormatCommand
  | SpacingCommand
  | CompareCommand
  | { readonly command: 'explain'; readonly rule: string | null }
  | { readonly command: 'serve' }
  | { readonly command: 'help' }
  | { readonly command: 'version' };

export interface CheckCommand {
  readonly command: 'check';
  readonly files: readonly string[];
  readonly format: 'text' | 'json' | 'sarif' | 'junit';
  readonly failOn: 'error' | 'warning';
  /** More warnings than this fail a check; null where any number is fine. */
  readonly maxWarnings: number | null;
  readonly baseline: string | null;
  readonly updateBaseline: string | null;
  readonly stdinFilename: string | null;
  readonly watch: boolean;
}

export interface FormatCommand {
  readonly command: 'format';
  readonly files: readonly string[];
  /** Only say which files are not formatted. */
  readonly check: boolean;
}

export interface SpacingCommand {
  readonly command: 'spacing';
  readonly file: string;
  readonly format: 'text' | 'csv' | 'markdown';
  /** Null takes what suits the board. */
  readonly gaps: readonly Length[] | null;
  readonly lengths: readonly Length[] | null;
  readonly width: Length | null;
  readonly only: { readonly layer: string | null; readonly from: string | null; readonly to: string | null };
  readonly placed: boolean;
}

export interface CompareCommand {
  readonly command: 'compare';
  readonly before: string;
  readonly after: string;
  readonly format: 'text' | 'markdown';
}

export type ReadArguments = { readonly read: Command } | { readonly refused: string };

export const usage = `quietrun check FILE... [--format text|json|sarif|junit] [--fail-on error|warning] [--max-warnings N]
                       [--baseline FILE] [--update-baseline FILE] [--stdin-filename NAME] [--watch]
quietrun format FILE... [--check]
quietrun spacing FILE [--format text|csv|markdown] [--gaps LENGTH,...] [--lengths LENGTH,...]
                      [--width LENGTH] [--layer NAME] [--from NET] [--to NET] [--placed]
quietrun compare OLD NEW [--format text|markdown]
quietrun explain [RULE]
quietrun serve --stdio
quietrun --version | --help

FILE: a .quiet file, or - for standard input
--baseline: findings that it lists are shown and fail nothing; --update-baseline writes those of now
Exit status: 0 nothing at or over --fail-on (default error), 1 findings, 2 the command could not run`;

export function readArguments(words: readonly string[]): ReadArguments {
  const [command, ...rest] = words;
  switch (command) {
    case 'check': return readCheck(rest);
    case 'format': return readFormat(rest);
    case 'spacing': return readSpacing(rest);
    case 'compare': return readCompare(rest);
    case 'explain': return rest.length <= 1 ? { read: { command, rule: rest[0] ?? null } } : { refused: 'explain takes one rule' };
    case 'serve': return rest.length === 1 && rest[0] === '--stdio' ? { read: { command } } : { refused: 'serve takes --stdio' };
    case '--help': case '-h': case 'help': return { read: { command: 'help' } };
    case '--version': return { read: { command: 'version' } };
    case undefined: return { refused: 'what is to be done?' };
    default: return { refused: `no command ${command}` };
  }
}

function readFormat(words: readonly string[]): ReadArguments {
  const answer = readOptions('format', words, new Map([['--check', 'flag']]));
  if ('refused' in answer) return answer;
  const { files, given } = answer;
  if (files.length === 0) return { refused: 'format which file?' };
  if (1 < files.filter((file) => file === '-').length) return { refused: '- stands twice' };
  return { read: { command: 'format', files, check: given.has('--check') } };
}

/** What each option takes. */
const checkOptions: Options = new Map<string, string | readonly string[]>([
  ['--format', ['text', 'json', 'sarif', 'junit']],
  ['--fail-on', ['error', 'warning']],
  ['--max-warnings', 'a count'],
  ['--baseline', 'a file'],
  ['--update-baseline', 'a file'],
  ['--stdin-filename', 'a name'],
  ['--watch', 'flag'],
]);

function readCheck(words: readonly string[]): ReadArguments {
  const answer = readOptions('check', words, checkOptions);
  if ('refused' in answer) return answer;
  const { files, given } = answer;
  const maxWarnings = given.get('--max-warnings') ?? null;
  if (maxWarnings !== null && !/^\d{1,9}$/.test(maxWarnings)) return { refused: `--max-warnings takes a count, not ${maxWarnings}` };
  if (files.length === 0) return { refused: 'check which file?' };
  if (1 < files.filter((file) => file === '-').length) return { refused: '- stands twice' };
  const unwatchable = given.has('--watch') ? (files.includes('-') ? 'standard input' : given.has('--update-baseline') ? 'a baseline that is being written' : null) : null;
  if (unwatchable !== null) return { refused: `--watch cannot watch ${unwatchable}` };
  return {
    read: {
      command: 'check',
      files,
      format: (given.get('--format') ?? 'text') as CheckCommand['format'],
      failOn: given.get('--fail-on') === 'warning' ? 'warning' : 'error',
      maxWarnings: maxWarnings === null ? null : Number(maxWarnings),
      baseline: given.get('--baseline') ?? null,
      updateBaseline: given.get('--update-baseline') ?? null,
      stdinFilename: given.get('--stdin-filename') ?? null,
      watch: given.has('--watch'),
    },
  };
}

const spacingOptions: Options = new Map<string, string | readonly string[]>([
  ['--format', ['text', 'csv', 'markdown']],
  ['--gaps', 'lengths'],
  ['--lengths', 'lengths'],
  ['--width', 'a length'],
  ['--layer', 'a name'],
  ['--from', 'a name'],
  ['--to', 'a name'],
  ['--placed', 'flag'],
]);

function readSpacing(words: readonly string[]): ReadArguments {
  const answer = readOptions('spacing', words, spacingOptions);
  if ('refused' in answer) return answer;
  const { files, given } = answer;
  if (files.length !== 1) return { refused: files.length === 0 ? 'spacing of which file?' : 'spacing takes one file' };
  const read = new Map<string, readonly Length[]>();
  for (const option of ['--gaps', '--lengths', '--width']) {
    const written = given.get(option);
    if (written === undefined) continue;
    const values = written.split(',').map(lengthIn);
    if (values.some((value) => value === null) || (option === '--width' && values.length !== 1)) return { refused: `${option} takes ${spacingOptions.get(option)} such as ${option === '--width' ? '0.15mm' : '0.15mm,0.3mm'}, not ${written}` };
    read.set(option, values as Length[]);
  }
  return {
    read: {
      command: 'spacing',
      file: files[0],
      format: (given.get('--format') ?? 'text') as SpacingCommand['format'],
      gaps: read.get('--gaps') ?? null,
      lengths: read.get('--lengths') ?? null,
      width: read.get('--width')?.[0] ?? null,
      only: { layer: given.get('--layer') ?? null, from: given.get('--from') ?? null, to: given.get('--to') ?? null },
      placed: given.has('--placed'),
    },
  };
}

function readCompare(words: readonly string[]): ReadArguments {
  const answer = readOptions('compare', words, new Map([['--format', ['text', 'markdown']]]));
  if ('refused' in answer) return answer;
  const { files, given } = answer;
  if (files.length !== 2) return { refused: 'compare takes two files, the old one first' };
  return { read: { command: 'compare', before: files[0], after: files[1], format: given.get('--format') === 'markdown' ? 'markdown' : 'text' } };
}

/** `0.15mm`, `6 mil`; between a micrometre and ten metres, as the language has it. */
function lengthIn(word: string): Length | null {
  const [, digits, spelling] = /^\s*(\d+\.?\d*|\.\d+)\s*(\S+)\s*$/.exec(word) ?? [];
  const unit = spelling === undefined ? undefined : unitSpelt(spelling);
  if (digits === undefined || unit?.dimension !== 'length') return null;
  const value = unit.inSi({ digits, exponent: 0 });
  return 1e-6 <= value && value <= 10 ? metres(value) : null;
}
