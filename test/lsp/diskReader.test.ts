import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, realpathSync, rmSync, symlinkSync, truncateSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { after, before, describe, it } from 'node:test';
import { pathToFileURL } from 'node:url';
import { diskReader } from '../../server/src/lsp/diskReader';

let root = '';
const at = (...parts: string[]) => path.join(root, ...parts);
const uri = (...parts: string[]) => pathToFileURL(at(...parts)).href;
const read = (...parts: string[]) => diskReader.read(uri(...parts), [uri('boards')]);

describe('the disk reader', () => {
  before(() => {
    root = realpathSync(mkdtempSync(path.join(os.tmpdir(), 'quietrun-disk-')));
    mkdirSync(at('boards/common'), { recursive: true });
    mkdirSync(at('boards/node_modules'));
    mkdirSync(at('outside'));
    writeFileSync(at('boards/a.quiet'), '\uFEFFnet A { once }\r\n');
    writeFileSync(at('boards/common/Parts.quiet'), 'net P { once }\n');
    writeFileSync(at('boards/node_modules/n.quiet'), '');
    writeFileSync(at('boards/huge.quiet'), '');
    truncateSync(at('boards/huge.quiet'), 8 * 1024 * 1024 + 1);
    writeFileSync(at('outside/secret.quiet'), 'net S { once }\n');
    symlinkSync(at('outside/secret.quiet'), at('boards/leak.quiet'));
    symlinkSync(at('outside'), at('boards/way-out'));
    symlinkSync(at('boards/common/Parts.quiet'), at('boards/linked.quiet'));
  });
  after(() => rmSync(root, { recursive: true, force: true }));

  it('reads text, without its byte-order mark', async () => {
    assert.deepEqual(await read('boards', 'a.quiet'), { text: 'net A { once }\r\n' });
  });

  it('says why it does not', async () => {
    assert.deepEqual(await read('boards', 'b.quiet'), { problem: 'missing' });
    assert.deepEqual(await read('boards', 'nowhere', 'b.quiet'), { problem: 'missing' });
    assert.deepEqual(await read('boards', 'a.quiet', 'b.quiet'), { problem: 'missing' });
    assert.deepEqual(await read('boards', 'common'), { problem: 'unreadable' });
    assert.deepEqual(await read('boards', 'huge.quiet'), { problem: 'too-large' });
    assert.deepEqual(await read('boards', 'common', 'parts.quiet'), { problem: 'case', spelling: 'common/Parts.quiet' });
    assert.deepEqual(await read('outside', 'secret.quiet'), { problem: 'outside' });
    assert.deepEqual(await diskReader.read('memory:///boards/a.quiet', [uri('boards')]), { problem: 'missing' });
  });

  it('follows a link within the folder, and none that leaves it', async () => {
    assert.deepEqual(await read('boards', 'linked.quiet'), { text: 'net P { once }\n' });
    assert.deepEqual(await read('boards', 'leak.quiet'), { problem: 'outside' });
    assert.deepEqual(await read('boards', 'way-out', 'secret.quiet'), { problem: 'outside' });
  });

  it('lists the boards below a folder, without links and packages', async () => {
    assert.deepEqual([...(await diskReader.list([uri('boards')]))].sort(), ['a.quiet', 'common/Parts.quiet', 'huge.quiet'].map((file) => uri('boards', file)));
  });
});
