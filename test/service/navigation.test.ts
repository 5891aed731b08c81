/** Definition, references, highlights: from any place of a name to all others. */
import assert from 'node:assert/strict';
import { describe } from 'node:test';
import { definition } from '../../server/src/service/definition';
import { highlights } from '../../server/src/service/highlights';
import { references } from '../../server/src/service/references';
import { atCursor } from './cursor';

const layers = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const nets = 'net A { swing 1 V; rise 1 ns }\nnet "B 1" { tolerates 1 V peak }\nnet D[0..1] is fast\nfamily fast { swing 1 V }\n';
const board = (run: string) => ({ 'board.quiet': `use "parts/nets.quiet"\nuse "layers.quiet"\n${run}`, 'parts/nets.quiet': nets, 'layers.quiet': layers });
const run = 'run r on TOP for 1 mm {\n  trace A 0.2 mm; gap 0.2 mm\n  trace "B 1" 0.2 mm; gap 0.2 mm\n  trace D[0..1] 0.1 mm spaced 0.1 mm\n}\nwaive over-budget on "B 1" because "x"\n';

function checkDefinition(title: string, files: Readonly<Record<string, string>>, ...expected: readonly string[]): void {
  atCursor(title, files, ({ session, path, offset, inText }) => assert.deepEqual(inText(definition(session, path, offset)), expected));
}

function checkReferences(title: string, files: Readonly<Record<string, string>>, ...expected: readonly string[]): void {
  atCursor(title, files, ({ session, path, offset, inText }) => assert.deepEqual(inText(references(session, path, offset)), expected));
}

describe('definition', () => {
  checkDefinition('of a net in another file', board(run.replace('trace A', 'trace <|>A')), 'parts/nets.quiet:1 A');
  checkDefinition('from the end of its name', board(run.replace('trace A', 'trace A<|>')), 'parts/nets.quiet:1 A');
  checkDefinition('of a quoted name', board(run.replace('trace "B 1"', 'trace "B<|> 1"')), 'parts/nets.quiet:2 "B 1"');
  checkDefinition('of a range', board(run.replace('trace D[0..1]', 'trace D[0<|>..1]')), 'parts/nets.quiet:3 D[0..1]');
  checkDefinition('of a layer', board(run.replace('on TOP', 'on T<|>OP')), 'layers.quiet:1 TOP');
  checkDefinition('of the subject of a waiver', board(run.replace('on "B 1" because', 'on "<|>B 1" because')), 'parts/nets.quiet:2 "B 1"');
  checkDefinition('of a used file', { ...board(run), 'board.quiet': `use "par<|>ts/nets.quiet"\n${run}` }, 'parts/nets.quiet:1 ');
  checkDefinition('of a family, in the file that is used', { ...board(run), 'parts/nets.quiet': nets.replace('is fast', 'is fa<|>st') }, 'parts/nets.quiet:4 fast');
  checkDefinition('behind a name of two-unit characters', { 'board.quiet': 'net A { swing 1 V }\nnet "µΩ 🔌" { swing 1 V }\nlink l { between "µΩ 🔌" and A<|>; mutual 1 nH }\n' }, 'board.quiet:1 A');
  checkDefinition('of a keyword is nowhere', board(run.replace('trace A', 'tra<|>ce A')));
  checkDefinition('of a built-in family is nowhere', { 'board.quiet': 'net A is lvc<|>mos33\n' });
  checkDefinition('of an unknown name is nowhere', { 'board.quiet': 'net A is nob<|>ody\n' });
  checkDefinition('of a name that is declared twice is both', { 'board.quiet': 'net A { swing 1 V }\nnet A { swing 2 V }\nlink l { between <|>A and A; mutual 1 nH }\n' }, 'board.quiet:1 A', 'board.quiet:2 A');
});

describe('references', () => {
  checkReferences('of a net, from its declaration', { ...board(run), 'parts/nets.quiet': nets.replace('net A', 'net <|>A') }, 'board.quiet:4 A', 'parts/nets.quiet:1 A');
  checkReferences('of a net, waivers among them', board(run.replace('trace "B 1"', 'trace "B <|>1"')), 'board.quiet:5 "B 1"', 'board.quiet:8 "B 1"', 'parts/nets.quiet:2 "B 1"');
  checkReferences('of a layer', board(run.replace('on TOP', 'on <|>TOP')), 'board.quiet:3 TOP', 'layers.quiet:1 TOP');
  checkReferences('of a group, which nothing declares', { 'board.quiet': 'net A { swing 1 V; switches with <|>G }\nnet B { samples 1 us after G }\n' }, 'board.quiet:1 G', 'board.quiet:2 G');
  checkReferences('of a guard, which nothing declares', { 'board.quiet': `${layers}run r on TOP for 1 mm { guard G<|>ND 1 mm; gap 1 mm; guard GND 1 mm }\n` }, 'board.quiet:2 GND', 'board.quiet:2 GND');

  atCursor('without the declaration', board(run.replace('trace A', 'trace <|>A')), ({ session, path, offset, inText }) =>
    assert.deepEqual(inText(references(session, path, offset, { includeDeclaration: false })), ['board.quiet:4 A']));

  checkReferences('of a used file, over all projects that use it', { 'a.quiet': 'use "fam.quiet"\nnet A is f\n', 'b.quiet': 'use "fam.quiet"\nnet B is f\n', 'fam.quiet': 'family <|>f { swing 1 V }\n' }, 'a.quiet:2 f', 'b.quiet:2 f', 'fam.quiet:1 f');
});

describe('highlights', () => {
  const check = (title: string, files: Readonly<Record<string, string>>, ...expected: readonly string[]) =>
    atCursor(title, files, ({ session, path, offset, inText }) => assert.deepEqual(highlights(session, path, offset).map(({ span, kind }) => `${inText([{ path, span }])[0]} ${kind}`), expected));

  check('are those of this file alone', board(run.replace('trace "B 1"', 'trace "B <|>1"')), 'board.quiet:5 "B 1" use', 'board.quiet:8 "B 1" use');
  check('tell the declaration from the uses', { 'board.quiet': 'net A { once }\nlink l { between <|>A and A; mutual 1 nH }\n' }, 'board.quiet:1 A declaration', 'board.quiet:2 A use', 'board.quiet:2 A use');
  check('of a range', { ...board(run), 'parts/nets.quiet': nets.replace('net D[0..1]', 'net <|>D[0..1]') }, 'parts/nets.quiet:3 D[0..1] declaration');
  check('of a keyword are none', board(run.replace('trace A', 'tra<|>ce A')));
});
