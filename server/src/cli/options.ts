/** Options and files of one command, in any order. */

/** Option to the words that it takes, or to what it takes in words; a flag takes nothing. */
export type Options = ReadonlyMap<string, readonly string[] | 'flag' | string>;

export type ReadOptions = { readonly files: readonly string[]; readonly given: ReadonlyMap<string, string> } | { readonly refused: string };

export function readOptions(command: string, words: readonly string[], options: Options): ReadOptions {
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
    const takes = options.get(name);
    if (takes === undefined) return { refused: `${command} has no ${name}` };
    if (given.has(name)) return { refused: `${name} stands twice` };
    if (takes === 'flag') {
      if (attached !== undefined) return { refused: `${name} takes nothing` };
      given.set(name, '');
      continue;
    }
    const value = attached ?? words[(at += 1)];
    const isChoice = typeof takes !== 'string';
    if (value === undefined || value === '') return { refused: `${name} takes ${isChoice ? takes.join(' or ') : takes}` };
    if (isChoice && !takes.includes(value)) return { refused: `${name} takes ${takes.join(' or ')}, not ${value}` };
    given.set(name, value);
  }
  return { files, given };
}

function splitOption(word: string): readonly [string, string | undefined] {
  const equals = word.startsWith('--') ? word.indexOf('=') : -1;
  return equals < 0 ? [word, undefined] : [word.slice(0, equals), word.slice(equals + 1)];
}
