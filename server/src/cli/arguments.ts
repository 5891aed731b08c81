/** The words of the command line, read into a command; what does not fit is one sentence. */
export type Command =
  | CheckCommand
  | { readonly command: 'explain'; readonly rule: string | null }
  | { readonly command: 'serve' }
  | { readonly command: 'help' }
  | { readonly command: 'version' };

export interface CheckCommand {
  readonly command: 'check';
  readonly files: readonly string[];
  readonly format: 'text' | 'json';
  readonly failOn: 'error' | 'warning';
  readonly stdinFilename: string | null;
}

export type ReadArguments = { readonly read: Command } | { readonly refused: string };

export const usage = `quietrun check FILE... [--format text|json] [--fail-on error|warning] [--stdin-filename NAME]
quietrun explain [RULE]
quietrun serve --stdio
quietrun --version | --help

FILE: a .quiet file, or - for standard input
Exit status: 0 nothing at or over --fail-on (default error), 1 findings, 2 the command could not run`;

export function readArguments(words: readonly string[]): ReadArguments {
  const [command, ...rest] = words;
  switch (command) {
    case 'check': return readCheck(rest);
    case 'explain': return rest.length <= 1 ? { read: { command, rule: rest[0] ?? null } } : { refused: 'explain takes one rule' };
    case 'serve': return rest.length === 1 && rest[0] === '--stdio' ? { read: { command } } : { refused: 'serve takes --stdio' };
    case '--help': case '-h': case 'help': return { read: { command: 'help' } };
    case '--version': return { read: { command: 'version' } };
    case undefined: return { refused: 'what is to be done?' };
    default: return { refused: `no command ${command}` };
  }
}

/** Option to the words that it takes; null where any will do. */
const options: ReadonlyMap<string, readonly string[] | null> = new Map([
  ['--format', ['text', 'json']],
  ['--fail-on', ['error', 'warning']],
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
    if (value === undefined || value === '') return { refused: `${name} takes ${choices?.join(' or ') ?? 'a name'}` };
    if (choices !== null && !choices.includes(value)) return { refused: `${name} takes ${choices.join(' or ')}, not ${value}` };
    given.set(name, value);
  }
  if (files.length === 0) return { refused: 'check which file?' };
  if (1 < files.filter((file) => file === '-').length) return { refused: '- stands twice' };
  return {
    read: {
      command: 'check',
      files,
      format: given.get('--format') === 'json' ? 'json' : 'text',
      failOn: given.get('--fail-on') === 'warning' ? 'warning' : 'error',
      stdinFilename: given.get('--stdin-filename') ?? null,
    },
  };
}

function splitOption(word: string): readonly [string, string | undefined] {
  const equals = word.startsWith('--') ? word.indexOf('=') : -1;
  return equals < 0 ? [word, undefined] : [word.slice(0, equals), word.slice(equals + 1)];
}
