/** Projects of several files: what `use` reaches, and what it must not. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { resolveProject } from '../../server/src/board/project';
import type { SourceAnswer } from '../../server/src/board/sources';
import { usePath } from '../../server/src/board/usePath';
import { parse } from '../../server/src/syntax/parse';
import { found, layers, nets, resolved } from './resolved';

describe('use', () => {
  it('makes one set of names of all files, each once', () => {
    const others = { 'common/a.quiet': `use "layers.quiet"\n${nets}`, 'common/layers.quiet': layers };
    const text = 'use "common/a.quiet"\nuse "common/layers.quiet"\nrun r on TOP for 1 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\n';
    assert.deepEqual(found(text, others), []);
    const project = resolved(text, others);
    assert.deepEqual(project.files, ['board.quiet', 'common/a.quiet', 'common/layers.quiet']);
    assert.equal(project.stackups.length, 1);
    assert.equal(project.nets.get('A')!.place.path, 'common/a.quiet');
    assert.deepEqual(project.includes.map(({ path }) => path), ['common/a.quiet', 'common/layers.quiet', 'common/layers.quiet']);
    assert.equal(project.complete, true);
  });

  it('lets the declaration of the root stand', () => {
    const project = resolved('use "a.quiet"\nnet A { swing 1 V }\n', { 'a.quiet': 'net A { swing 2 V }\n' });
    assert.equal(project.nets.get('A')!.swing!.value, 1);
    assert.deepEqual(project.errors.map(({ rule, place }) => [rule, place.path]), [['duplicate-name', 'a.quiet']]);
  });

  it('says at the string what is wrong', () => {
    const cases: readonly (readonly [string, SourceAnswer, string])[] = [
      ['x.quiet', { problem: 'missing' }, 'there is no file "x.quiet"'],
      ['../x.quiet', { problem: 'outside' }, '"../x.quiet" lies outside the workspace folder'],
      ['X.quiet', { problem: 'case', actual: 'x.quiet' }, '"X.quiet" differs in case from the file\'s name, "x.quiet"'],
      ['x.quiet', { problem: 'too-large' }, '"x.quiet" is larger than 8 MiB'],
    ];
    for (const [written, answer, message] of cases) {
      const project = resolved(`use "${written}"\nnet A is unknown\n`, { [written]: answer });
      assert.deepEqual(project.errors.map((error) => [error.rule, error.message]), [['include', message]]);
      assert.deepEqual(project.gaps.filter(({ place }) => place.span.start === 4).map(({ affects }) => affects), [null]);
      assert.equal(project.complete, false);
    }
    assert.deepEqual(found('use "a\\b.quiet"\nuse "/etc/x.quiet"\nuse "file:///x.quiet"\nuse ""\nuse "%2e%2e/x.quiet"\n'), [
      'include ["a\\b.quiet"]: paths are written with "/": "a/b.quiet"',
      'include ["/etc/x.quiet"]: "/etc/x.quiet" is not relative to this file',
      'include ["file:///x.quiet"]: "file:///x.quiet" is not relative to this file',
      'include [""]: a path is missing: one relative to this file, such as "common/stackup.quiet"',
      'include ["%2e%2e/x.quiet"]: "%2e%2e/x.quiet" lies outside the workspace folder',
    ]);
  });

  it('mends the case of a path', () => {
    const { errors } = resolved('use "Common.quiet"\n', { 'Common.quiet': { problem: 'case', actual: 'common.quiet' } });
    assert.deepEqual(errors[0].corrections.map(({ newText }) => newText), ['"common.quiet"']);
    const elsewhere = resolved('use "Parts/Common.quiet"\n', { 'Parts/Common.quiet': { problem: 'case', actual: '/home/x/parts/common.quiet' } });
    assert.deepEqual(elsewhere.errors[0].corrections.map(({ newText }) => newText), ['"parts/common.quiet"']);
  });

  it('waits in silence for a file that has not been read yet', () => {
    const project = resolved('use "x.quiet"\nnet A is unknown\n', { 'x.quiet': { problem: 'unread' } });
    assert.deepEqual(project.errors, []);
    assert.equal(project.complete, false);
  });

  it('finds cycles, and reads the files all the same', () => {
    const others = { 'b.quiet': 'use "c.quiet"\nnet B { load 1 kohm }\n', 'c.quiet': 'use "board.quiet"\nnet C is B\nfamily B { load 1 kohm }\n' };
    assert.deepEqual(found('use "b.quiet"\nnet A is B\n', others), ['include ["board.quiet"]: board.quiet uses b.quiet uses c.quiet uses board.quiet again']);
    assert.equal(resolved('use "b.quiet"\n', others).nets.size, 2);
    assert.deepEqual(found('use "board.quiet"\n'), ['include ["board.quiet"]: board.quiet uses itself']);
  });

  it('goes sixteen files deep', () => {
    const chain = (length: number) => Object.fromEntries(Array.from({ length }, (_, index) => [`f${index}.quiet`, index + 1 < length ? `use "f${index + 1}.quiet"\n` : 'net A { swing 1 V }\n']));
    assert.equal(resolved('use "f0.quiet"\n', chain(16)).nets.size, 1);
    const { errors, files } = resolved('use "f0.quiet"\n', chain(17));
    assert.deepEqual(errors.map(({ message }) => message), ['"f16.quiet" is more than 16 files away from board.quiet']);
    assert.equal(files.length, 17);
  });

  it('takes a thousand files', () => {
    const text = Array.from({ length: 1200 }, (_, index) => `use "f${index}.quiet"\n`).join('');
    const project = resolveProject('board.quiet', { read: (path) => ({ tree: parse(path === 'board.quiet' ? text : '') }) });
    assert.equal(project.files.length, 1000);
    assert.equal(project.errors.filter(({ rule }) => rule === 'include').length, 201);
  });

  it('says so when the root itself is not there', () => {
    const { errors, complete } = resolveProject('x.quiet', { read: () => ({ problem: 'missing' }) });
    assert.deepEqual(errors.map(({ rule, message }) => `${rule}: ${message}`), ['include: there is no file "x.quiet"']);
    assert.equal(complete, false);
  });
});

describe('the path of a `use`', () => {
  const cases: readonly (readonly [string, string, string])[] = [
    ['a/b.quiet', 'c.quiet', 'a/c.quiet'],
    ['a/b.quiet', './d/../c.quiet', 'a/c.quiet'],
    ['b.quiet', '../c.quiet', '../c.quiet'],
    ['../b.quiet', '../c.quiet', '../../c.quiet'],
    ['file:///home/x/b.quiet', '../c d.quiet', 'file:///home/c d.quiet'],
    ['file:///b.quiet', '../../c.quiet', 'outside'],
    ['scheme://host/b.quiet', '../c.quiet', 'outside'],
    ['/b.quiet', '../c.quiet', 'outside'],
    ['C:/x/b.quiet', '../c.quiet', 'C:/c.quiet'],
    ['C:/b.quiet', '../c.quiet', 'outside'],
    ['b.quiet', '%2E./c.quiet', 'outside'],
    ['b.quiet', 'c%2e.quiet', 'c%2e.quiet'],
  ];
  for (const [from, written, expected] of cases) {
    it(`${written} in ${from}`, () => {
      const joined = usePath(from, written);
      assert.equal('path' in joined ? joined.path : joined.problem, expected);
    });
  }
});
