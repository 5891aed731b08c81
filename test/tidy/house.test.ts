/** House style that a machine can check. */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { sourceFiles } from './sourceFiles';

const code = [...sourceFiles('server/src'), ...sourceFiles('client/src'), ...sourceFiles('test', ['.ts', '.mjs'])];
const everything = [...code, ...sourceFiles('.', ['.md', '.json', '.quiet', '.yml', '.svg', '.html']).filter(({ file }) => !/\/test\/reference\//.test(file)), ...sourceFiles('examples', ['.mjs'])];

const longest = 400;

describe('house style', () => {
  it('keeps files short, or says why not', () => {
    const reasons = readFileSync('DEVELOPERS.md', 'utf8');
    const long = code.filter(({ file, text }) => longest < text.split('\n').length && !reasons.includes(file.split('/').at(-1)!));
    assert.deepEqual(long.map(({ file, text }) => `${file}: ${text.split('\n').length} lines`), []);
  });

  it('leaves nothing undone, skipped or silenced', () => {
    const marks = ['TO' + 'DO', 'FIX' + 'ME', 'it.' + 'skip', 'describe.' + 'skip', 'it.' + 'only', '@ts-' + 'ignore', '@ts-' + 'nocheck', '@ts-' + 'expect-error', 'eslint-' + 'disable', 'skip' + ': true'];
    assert.deepEqual(mentions(code, marks), []);
  });

  it('speaks of the product and of nothing around it', () => {
    const words = ['lec' + 'ture', 'brief' + '.md', 'helper ' + 'session', 'sub' + 'agent', 'language ' + 'model', '/wo' + 'rk/', '/tm' + 'p/', 'prompt ' + 'injection'];
    assert.deepEqual(mentions(everything, words), []);
  });

  it('has no folder or name for whatever did not fit elsewhere', () => {
    const vague = code.filter(({ file }) => /\/(utils?|helpers?|misc|common)\/|(Manager|Helper|Utils?)\.ts$/.test(file));
    assert.deepEqual(vague.map(({ file }) => file), []);
  });

  it('names each file of the server for what it exports', () => {
    const nameless = sourceFiles('server/src').filter(({ file, text }) => !/^export /m.test(text) && !/\/(server\.(node|browser)|cli)\.ts$/.test(file));
    assert.deepEqual(nameless.map(({ file }) => file), []);
  });

  it('keeps entry points to wiring', () => {
    const entries = sourceFiles('server/src').filter(({ file }) => file.split('/').length === 3);
    assert.deepEqual(entries.filter(({ text }) => 45 < text.split('\n').length).map(({ file }) => file), []);
  });
});

function mentions(files: readonly { file: string; text: string }[], words: readonly string[]): readonly string[] {
  return files.flatMap(({ file, text }) => {
    const lower = text.toLowerCase();
    return words.filter((word) => lower.includes(word.toLowerCase())).map((word) => `${file}: ${word}`);
  });
}
