import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { Paths } from '../../server/src/lsp/paths';

describe('paths', () => {
  it('are addresses with nothing encoded, and lead back to what the client wrote', () => {
    const paths = new Paths();
    for (const [uri, key] of [
      ['file:///boards/two%20words/%C2%B5.quiet', 'file:///boards/two words/µ.quiet'],
      ['file:///c%3A/boards/a.quiet', 'file:///c:/boards/a.quiet'],
      ['memory://box/a%23b.quiet', 'memory://box/a#b.quiet'],
      ['file:///100%25/%252e%252e/a.quiet', 'file:///100%/%2e%2e/a.quiet'],
    ]) {
      assert.equal(paths.keyOf(uri), key);
      assert.equal(paths.uriOf(key), uri);
    }
  });

  it('lead to an address that reads the same where the client never wrote one', () => {
    const paths = new Paths();
    for (const key of ['file:///boards/two words/µ.quiet', 'memory://box/a#b?.quiet', 'file:///100%/%2e%2e/a.quiet']) {
      assert.equal(new Paths().keyOf(paths.uriOf(key)), key);
    }
  });

  it('do not tell a drive by the case of its letter', () => {
    assert.equal(new Paths().keyOf('file:///C:/a.quiet'), new Paths().keyOf('file:///c%3A/a.quiet'));
  });

  it('are none for a version of a file', () => {
    assert.equal(new Paths().keyOf('git:/a.quiet?ref=HEAD'), null);
  });

  it('put a file that was never saved where it would be saved', () => {
    const paths = new Paths();
    paths.setFolders(['memory://box/boards']);
    const key = paths.keyOf('untitled:Untitled-1')!;
    assert.equal(key.slice(0, key.lastIndexOf('/') + 1), 'memory://box/boards/');
    assert.equal(paths.uriOf(key), 'untitled:Untitled-1');
    assert.equal(paths.keyOf('untitled:/elsewhere/new.quiet'), 'memory://box/elsewhere/new.quiet');
  });

  it('may be used where a workspace folder holds them, else below the folder of an open file', () => {
    const paths = new Paths();
    paths.setFolders(['file:///boards', 'file:///more/']);
    const open = ['file:///boards/a.quiet', 'file:///alone/sub/b.quiet'];
    assert.deepEqual(paths.foldersAround('file:///boards/x/c.quiet', open), ['file:///boards/']);
    assert.deepEqual(paths.foldersAround('file:///more/c.quiet', open), ['file:///more/']);
    assert.deepEqual(paths.foldersAround('file:///alone/sub/c.quiet', open), ['file:///alone/sub/']);
    for (const outside of ['file:///boardsx/c.quiet', 'file:///alone/c.quiet', 'file:///c.quiet', 'memory:///boards/c.quiet', 'file:///boards/../c.quiet', 'file:///boards/./c.quiet', 'file:///boards/..\\..\\c.quiet']) {
      assert.deepEqual(paths.foldersAround(outside, open), [], outside);
    }
  });
});
