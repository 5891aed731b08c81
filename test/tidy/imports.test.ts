/** An import points down the list of rooms, never up, and each room keeps to its own doors. */
import assert from 'node:assert/strict';
import path from 'node:path';
import { describe, it } from 'node:test';
import { sourceFiles } from './sourceFiles';

/** From the top; what stands on one line may not import each other. */
const order = [['entry'], ['lsp', 'cli'], ['service', 'disk'], ['spacing', 'compare'], ['rules', 'fixes'], ['budget'], ['board', 'physics'], ['syntax', 'numeric', 'pictures'], ['units']] as const;

/** A fix mends what a rule found, so it may read the rule; never the other way round. */
const sideways: ReadonlySet<string> = new Set(['fixes > rules']);

/** Handed numbers, so that they can be checked and used without a board. */
const numbersOnly: ReadonlySet<string> = new Set(['physics', 'numeric', 'pictures']);

interface Import {
  readonly file: string;
  readonly from: string;
  readonly to: string;
  readonly target: string;
}

const files = sourceFiles('server/src');
const imports = files.flatMap(({ file, text }) => importsOf(text).map((target): Import => ({ file, from: roomOf(file), to: roomOf(resolved(file, target)), target })));

describe('imports', () => {
  it('were found', () => assert.ok(100 < imports.length));

  it('point down', () => {
    const wrong = imports.filter(({ from, to, target }) => target.startsWith('.') && from !== to && to !== 'outside' && !sideways.has(`${from} > ${to}`) && !(levelOf(from) < levelOf(to)));
    assert.deepEqual(wrong.map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('reach out of the server for its version only', () => {
    const outside = imports.filter(({ to, target }) => target.startsWith('.') && to === 'outside');
    assert.deepEqual(outside.filter(({ from, target }) => from !== 'entry' || !target.endsWith('/package.json')).map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('leave text out of physics, numeric and pictures', () => {
    const wrong = imports.filter(({ from, to }) => numbersOnly.has(from) && (to === 'syntax' || to === 'board'));
    assert.deepEqual(wrong.map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('keep numeric free of everything', () => {
    const wrong = imports.filter(({ from, to }) => from === 'numeric' && to !== 'numeric');
    assert.deepEqual(wrong.map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('bring the language-server library into lsp and the entry points only', () => {
    const wrong = imports.filter(({ from, target }) => target.startsWith('vscode-languageserver') && from !== 'lsp' && from !== 'entry');
    assert.deepEqual(wrong.map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('let nothing but the doors to the outside reach for node', () => {
    const wrong = imports.filter(({ from, target }) => target.startsWith('node:') && !['lsp', 'cli', 'disk', 'entry'].includes(from));
    assert.deepEqual(wrong.map(({ file, target }) => `${file} imports ${target}`), []);
  });

  it('take of the server only what the client’s one file of messages holds', () => {
    const wrong = sourceFiles('client/src').flatMap(({ file, text }) => importsOf(text).filter((target) => target.includes('server/src')).map((target) => ({ file, target })));
    assert.ok(new Set(wrong.map(({ target }) => path.basename(target))).size <= 1, JSON.stringify(wrong));
  });
});

function importsOf(text: string): readonly string[] {
  return [...text.matchAll(/^\s*(?:import|export)\b[^'";]*?\bfrom\s*'([^']+)'|^\s*import\s*'([^']+)'|\bimport\('([^']+)'\)/gm)].map((match) => (match[1] ?? match[2] ?? match[3])!);
}

function resolved(file: string, target: string): string {
  return target.startsWith('.') ? path.posix.join(path.posix.dirname(file), target) : target;
}

function roomOf(file: string): string {
  const [, room, ...rest] = /^server\/src\/([^/]+)(\/.*)?$/.exec(file) ?? [];
  return room === undefined ? 'outside' : rest[0] === undefined ? 'entry' : room;
}

function levelOf(room: string): number {
  const level = order.findIndex((rooms) => (rooms as readonly string[]).includes(room));
  assert.ok(0 <= level, `${room} is not a room: say in DEVELOPERS.md what it is for, and here who may open it`);
  return level;
}
