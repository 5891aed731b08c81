import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { readArguments } from '../../server/src/cli/arguments';

const read = (words: string) => readArguments(words.split(' ').filter((word) => word !== ''));

describe('arguments', () => {
  it('reads what a gate needs', () => {
    assert.deepEqual(read('check a.quiet --format=junit --max-warnings 3 --baseline b.json --update-baseline c.json'), {
      read: { command: 'check', files: ['a.quiet'], format: 'junit', failOn: 'error', maxWarnings: 3, baseline: 'b.json', updateBaseline: 'c.json', stdinFilename: null, watch: false },
    });
  });

  it('reads a check with its options in any order', () => {
    assert.deepEqual(read('check a.quiet --format json b.quiet --fail-on=warning'), {
      read: { command: 'check', files: ['a.quiet', 'b.quiet'], format: 'json', failOn: 'warning', maxWarnings: null, baseline: null, updateBaseline: null, stdinFilename: null, watch: false },
    });
  });

  it('takes - for standard input, with a name', () => {
    assert.deepEqual(read('check - --stdin-filename board.quiet'), {
      read: { command: 'check', files: ['-'], format: 'text', failOn: 'error', maxWarnings: null, baseline: null, updateBaseline: null, stdinFilename: 'board.quiet', watch: false },
    });
  });

  for (const [words, why] of [
    ['', 'what is to be done?'],
    ['chek a.quiet', 'no command chek'],
    ['check', 'check which file?'],
    ['check a.quiet --format xml', '--format takes text or json or sarif or junit, not xml'],
    ['check a.quiet --format', '--format takes text or json or sarif or junit'],
    ['check a.quiet --max-warnings', '--max-warnings takes a count'],
    ['check a.quiet --max-warnings many', '--max-warnings takes a count, not many'],
    ['check a.quiet --max-warnings=-1', '--max-warnings takes a count, not -1'],
    ['check a.quiet --baseline', '--baseline takes a file'],
    ['check - --watch', '--watch cannot watch standard input'],
    ['check a.quiet --watch --update-baseline b.json', '--watch cannot watch a baseline that is being written'],
    ['check a.quiet --watch=yes', '--watch takes nothing'],
    ['check a.quiet --fail-on error --fail-on error', '--fail-on stands twice'],
    ['check - -', '- stands twice'],
    ['check a.quiet --colour', 'check has no --colour'],
    ['explain a b', 'explain takes one rule'],
    ['serve', 'serve takes --stdio'],
  ]) {
    it(`says what is wrong with: ${words}`, () => assert.deepEqual(read(words), { refused: why }));
  }
});
