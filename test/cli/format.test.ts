/** `quietrun format` on files of its own. */
import assert from 'node:assert/strict';
import { chmodSync, lstatSync, readdirSync, readFileSync, statSync, symlinkSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { commandLine } from './commandLine';

const { folder, put, textOf, quietrun } = commandLine();
const untidy = 'net  A { once }\nrun r for 5mm{\nwithout G\n}\n';
const tidy = 'net A { once }\nrun r for 5 mm {\n  without G\n}\n';
const modified = (name: string) => statSync(path.join(folder, name)).mtimeMs;

describe('quietrun format', () => {
  it('sets the files that are named, says so, and leaves all others', async () => {
    put('a.quiet', untidy);
    put('b.quiet', untidy.replaceAll('\n', '\r\n'));
    put('other.quiet', untidy);
    put('tidy.quiet', tidy);
    const before = modified('tidy.quiet');
    const { code, out, complaints } = await quietrun(['format', 'a.quiet', './b.quiet', 'tidy.quiet', './a.quiet']);
    assert.deepEqual([code, out, complaints], [0, './a.quiet: 3 lines formatted\n./b.quiet: 3 lines formatted\ntidy.quiet: formatted already\n', '']);
    assert.deepEqual(['a.quiet', 'b.quiet', 'other.quiet'].map(textOf), [tidy, tidy.replaceAll('\n', '\r\n'), untidy]);
    assert.equal(modified('tidy.quiet'), before);
    assert.deepEqual(readdirSync(folder).filter((name) => name.endsWith('.tmp')), []);
  });

  it('only says what it would do with --check, and exits with 1', async () => {
    put('a.quiet', untidy);
    const { code, out } = await quietrun(['format', '--check', 'a.quiet', 'tidy.quiet']);
    assert.deepEqual([code, out], [1, 'a.quiet:1: 3 lines not formatted\n1 of 2 files not formatted; quietrun format without --check sets it in order.\n']);
    assert.equal(textOf('a.quiet'), untidy);
    const second = await quietrun(['format', 'tidy.quiet', '--check']);
    assert.deepEqual([second.code, second.out], [0, '1 file formatted already.\n']);
  });

  it('formats standard input to standard output, and nothing else goes there', async () => {
    put('a.quiet', untidy);
    const { code, out, complaints } = await quietrun(['format', '-', 'a.quiet'], `\ufeff${untidy}gap  3\n`);
    assert.deepEqual([code, out], [0, `\ufeff${tidy}gap  3\n`]);
    assert.equal(complaints, 'a.quiet: 3 lines formatted\nquietrun: 1 line of standard input cannot be read and stays as it is: line 5\n');
    assert.equal((await quietrun(['format', '-', '--check'], untidy)).code, 1);
  });

  it('names the lines that it leaves', async () => {
    put('broken.quiet', 'net  A { swing 3 }\nnet  B { once }\nnet C { rise 3 }\n');
    const { code, complaints } = await quietrun(['format', 'broken.quiet']);
    assert.deepEqual([code, complaints], [0, 'quietrun: 2 lines of broken.quiet cannot be read and stay as they are: lines 1, 3\n']);
    assert.equal(textOf('broken.quiet'), 'net  A { swing 3 }\nnet B { once }\nnet C { rise 3 }\n');
  });

  it('keeps the byte-order mark, the rights of the file, and the link that leads to it', async () => {
    put('real/board.quiet', `\ufeff${untidy}`);
    chmodSync(path.join(folder, 'real/board.quiet'), 0o640);
    symlinkSync('real/board.quiet', path.join(folder, 'link.quiet'));
    assert.equal((await quietrun(['format', 'link.quiet'])).code, 0);
    assert.equal(textOf('real/board.quiet'), `\ufeff${tidy}`);
    assert.equal(statSync(path.join(folder, 'real/board.quiet')).mode & 0o777, 0o640);
    assert.ok(lstatSync(path.join(folder, 'link.quiet')).isSymbolicLink());
  });

  it('writes no file when one cannot be read', async () => {
    put('a.quiet', untidy);
    const bytes = new Uint8Array([...new TextEncoder().encode('net A { once } # '), 0xe9, 0x0a]);
    put('latin.quiet', bytes);
    for (const [file, why] of [['latin.quiet', 'latin.quiet is not UTF-8: it stays as it is'], ['none.quiet', 'none.quiet is not there'], ['.', '. is not a file']] as const) {
      const { code, out, complaints } = await quietrun(['format', 'a.quiet', file]);
      assert.deepEqual([code, out, complaints], [2, '', `quietrun: ${why}\n`]);
    }
    assert.equal(textOf('a.quiet'), untidy);
    assert.deepEqual(new Uint8Array(readFileSync(path.join(folder, 'latin.quiet'))), bytes);
    const input = await quietrun(['format', '-'], bytes);
    assert.deepEqual([input.code, input.out, input.complaints], [2, '', 'quietrun: standard input is not UTF-8: it stays as it is\n']);
  });

  it('leaves a file that is read-only, sets the others, and exits with 2', async () => {
    put('kept.quiet', untidy);
    chmodSync(path.join(folder, 'kept.quiet'), 0o444);
    put('a.quiet', untidy);
    const { code, out, complaints } = await quietrun(['format', 'kept.quiet', 'a.quiet']);
    assert.deepEqual([code, out, complaints], [2, 'a.quiet: 3 lines formatted\n', 'quietrun: kept.quiet cannot be written (it is read-only): it stays as it is\n']);
    assert.deepEqual(['kept.quiet', 'a.quiet'].map(textOf), [untidy, tidy]);
  });

  it('says in one sentence what it cannot take', async () => {
    const refused = async (...words: string[]) => (await quietrun(['format', ...words])).complaints.split('\n')[0];
    assert.deepEqual(await Promise.all([refused(), refused('--check'), refused('a.quiet', '--fix'), refused('--check', '--check', 'a'), refused('-', '-'), refused('--', '--check')]), [
      'quietrun: format which file?', 'quietrun: format which file?', 'quietrun: format has no --fix', 'quietrun: --check stands twice', 'quietrun: - stands twice', 'quietrun: --check is not there',
    ]);
  });
});
