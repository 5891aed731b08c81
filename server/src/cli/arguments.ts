/** The words of the command line, read into a command; what does not fit is one sentence. */
export type Command =
  | CheckCommand
  | FormatCommand
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
}

export interface FormatCommand {
  readonly command: 'format';
  readonly files: readonly string[];
  /** Only say which files are not formatted. */
  readonly check: boolean;
}

export type ReadArguments = { readonly read: Command } | { readonly refused: string };

export const usage = `quietrun check FILE... [--format text|json|sarif|junit] [--fail-on error|warning] [--max-warnings N]
                       [--baseline FILE] [--update-baseline FILE] [--stdin-filename NAME]
quietrun format FILE... [--check]
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
    case 'explain': return rest.length <= 1 ? { read: { command, rule: rest[0] ?? null } } : { refused: 'explain takes one rule' };
    case 'serve': return rest.length === 1 && rest[0] === '--stdio' ? { read: { command } } : { refused: 'serve takes --stdio' };
    case '--help': case '-h': case 'help': return { read: { command: 'help' } };
    case '--version': return { read: { command: 'version' } };
    case undefined: return { refused: 'what is to be done?' };
    default: return { refused: `no command ${command}` };
  }
}

function readFormat(words: readonly string[]): ReadArguments {
  const end = words.indexOf('--');
  const [before, names] = end < 0 ? [words, []] : [words.slice(0, end), words.slice(end + 1)];
  const options = before.filter((word) => word.startsWith('-') && word !== '-');
  const files = [...before.filter((word) => !options.includes(word)), ...names];
  const wrong = options.find((option) => option !== '--check');
  if (wrong !== undefined) return { refused: `format has no ${wrong}` };
  if (1 < options.length) return { refused: '--check stands twice' };
  if (files.length === 0) return { refused: 'format which file?' };
  if (1 < files.filter((file) => file === '-').length) return { refused: '- stands twice' };
  return { read: { command: 'format', files, check: options.length === 1 } };
}

/** Option to the words that it takes; null where any will do. */
const options: ReadonlyMap<string, readonly string[] | null> = new Map([
  ['--format', ['text', 'json', 'sarif', 'junit']],
  ['--fail-on', ['error', 'warning']],
  ['--max-warnings', null],
  ['--baseline', null],
  ['--update-baseline', null],
  ['--stdin-filename', null],
]);

function readCheck(words: readonly string[]): ReadArguments {
  const files: string[] = [];
  const given = new Map<string, string>();
  for (let at = 0; at < words.length; at += 1) {
    // As with every command line, what follows is a name, whatever it looks like.
    if (words[at] === '--') {
      files.push(...words.slice(at + 1));
      break;
    }
    const [name, attached] = splitOption(words[at]);
    if (!name.startsWith('-') || name === '-') {
      files.push(words[at]);
      continue;
    }
    const choices = options.get(name);
    if (choices === undefined) return { refused: `check has no ${name}` };
    if (given.has(name)) return { refused: `${name} stands twice` };
    const value = attached ?? words[(at += 1)];
    if (value === undefined || value === '') return { refused: `${name} takes ${choices?.join(' or ') ?? wantedBy(name)}` };
    if (choices !== null && !choices.includes(value)) return { refused: `${name} takes ${choices.join(' or ')}, not ${value}` };
    given.set(name, value);
  }
  const maxWarnings = given.get('--max-warnings') ?? null;
  if (maxWarnings !== null && !/^\d{1,9}$/.test(maxWarnings)) return { refused: `--max-warnings takes a count, not ${maxWarnings}` };
  if (files.length === 0) return { refused: 'check which file?' };
  if (1 < files.filter((file) => file === '-').length) return { refused: '- stands twice' };
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
    },
  };
}

const wantedBy = (option: string) => (option === '--max-warnings' ? 'a count' : option === '--stdin-filename' ? 'a name' : 'a file');

function splitOption(word: string): readonly [string, string | undefined] {
  const equals = word.startsWith('--') ? word.indexOf('=') : -1;
  return equals < 0 ? [word, undefined] : [word.slice(0, equals), word.slice(equals + 1)];
}
