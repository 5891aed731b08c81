/** What goes into the extension's package, and what its manifest promises. */
import assert from 'node:assert/strict';
import { existsSync, readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { deflateRawSync } from 'node:zlib';
import { starterBoard } from '../../client/src/starterBoard';
import { checkedText } from '../support/checkedText';

const manifest = JSON.parse(readFileSync('package.json', 'utf8'));

/** `.vscodeignore` leaves everything out, then takes in file by file or by one pattern in one folder. */
function packed(): string[] {
  const [everything, ...taken] = readFileSync('.vscodeignore', 'utf8').trim().split('\n');
  assert.equal(everything, '**');
  return taken.flatMap((line) => {
    const pattern = line.replace(/^!/, '');
    const name = new RegExp(`^${path.basename(pattern).replace(/[.+]/g, '\\$&').replaceAll('*', '[^/]*')}$`);
    return readdirSync(path.dirname(pattern)).filter((each) => name.test(each)).map((each) => path.join(path.dirname(pattern), each));
  });
}

describe('the package of the extension', () => {
  const files = packed();

  it('holds both entry points, both servers, the icon and every file that the manifest names', () => {
    const { contributes } = manifest;
    const named = [manifest.main, manifest.browser, manifest.icon, 'dist/server.node.cjs', 'dist/server.browser.js', 'README.md', 'CHANGELOG.md', 'LICENSE', 'package.json',
      contributes.languages[0].configuration, contributes.grammars[0].path, ...contributes.walkthroughs[0].steps.map(({ media }: { media: { markdown: string } }) => media.markdown)];
    for (const file of named.map((each: string) => path.normalize(each))) assert.ok(files.includes(file), `${file} is not packed`);
  });

  it('holds nothing that the build leaves over', () => {
    assert.deepEqual(files.filter((file) => /\.(map|ts|tsbuildinfo|log|vsix)$|node_modules|(^|\/)\.|cli\.cjs/.test(file)), []);
  });

  it('stays under a megabyte', () => {
    // A package is a zip archive: deflated file by file. Its directory adds a few hundred bytes a file.
    const size = files.reduce((sum, file) => sum + deflateRawSync(readFileSync(file)).length + 300, 0);
    assert.ok(size < 1_000_000, `${size} bytes`);
    assert.ok(100_000 < size, `${size} bytes: was it built?`);
  });
});

describe('the manifest', () => {
  it('keeps to ten commands of one category, fifteen settings of resource scope, and binds no keys', () => {
    const { commands, configuration, keybindings } = manifest.contributes;
    assert.ok(commands.length <= 10);
    assert.deepEqual([...new Set(commands.map(({ category }: { category: string }) => category))], ['Quietrun']);
    const settings = Object.entries<{ scope: string; markdownDescription: string }>(configuration.properties);
    assert.ok(settings.length <= 15);
    for (const [name, { scope, markdownDescription }] of settings) {
      assert.ok(scope === 'resource' || name === 'quietrun.trace.server', `${name} is of scope ${scope}`);
      assert.ok(markdownDescription.length > 40, name);
    }
    assert.equal(keybindings, undefined);
  });

  it('offers no command in a walkthrough or a welcome that does not exist', () => {
    const known = new Set(manifest.contributes.commands.map(({ command }: { command: string }) => command));
    const offered = [...JSON.stringify([manifest.contributes.walkthroughs, manifest.contributes.viewsWelcome, manifest.contributes.menus]).matchAll(/(?:command:|onCommand:|"command":")([\w.]+)/g)].map(([, name]) => name);
    assert.ok(0 < offered.length);
    assert.deepEqual(offered.filter((name) => !known.has(name)), []);
  });

  it('has an icon of its own', () => {
    const icon = readFileSync(manifest.icon);
    assert.equal(icon.toString('latin1', 1, 4), 'PNG');
    assert.ok(128 <= icon.readUInt32BE(16) && icon.readUInt32BE(16) === icon.readUInt32BE(20), 'square, 128 pixels or more');
    assert.ok(existsSync(manifest.icon.replace('.png', '.svg')), 'the drawing that it was made from');
  });
});

describe('the board to begin with', () => {
  it('is the one of the README', () => {
    const block = /```\n +(stackup \{\n[\s\S]*?)\n *```/.exec(readFileSync('README.md', 'utf8'))![1];
    assert.equal(`${block.replace(/^ {3}/gm, '')}\n`, starterBoard);
  });

  it('has one thing to mend, and nothing else that is wrong', async () => {
    const { file } = await checkedText(starterBoard);
    assert.deepEqual(file.findings.filter(({ severity }) => severity === 'error' || severity === 'warning').map(({ rule }) => rule), ['over-budget']);
  });
});
