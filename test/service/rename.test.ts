/** Rename: every place that means the name follows, what cannot follow is refused with the reason. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { editedText } from '../../server/src/service/editedText';
import { renameEdits, renameTarget } from '../../server/src/service/rename';
import { Session } from '../../server/src/service/session';
import { atCursor } from './cursor';

const layers = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const nets = 'family fast is lvcmos33 { swing 1 V }\nnet A { swing 1 V; rise 1 ns; switches with G }\nnet "B 1" { tolerates 1 mV peak; samples 1 ns after G }\nnet D[0..3] is fast\n';
const rest = `run r on TOP for 9 mm {
  trace A 0.2 mm; gap 0.2 mm
  trace "B 1" 0.2 mm; gap 0.2 mm
  trace D[0..3] 0.1 mm spaced 0.1 mm
}
loop l on TOP { carries A; circle 9 mm; over GND }
return ret { measured 1 mohm; carries A; refers "B 1" }
link body { between A and "B 1"; mutual 1 nH }
shield lid { covers "B 1"; covers l; sheet copper 1 mm; slot 1 mm; grounded }
waive over-budget on "B 1" because "A is quiet then"
`;
const board = (text: string) => ({ 'board.quiet': `use "parts/nets.quiet"\nuse "layers.quiet"\n${text}`, 'parts/nets.quiet': nets, 'layers.quiet': layers });

/** What becomes of the lines that change, as `path:line text`. */
function becomes(title: string, files: Readonly<Record<string, string>>, typed: string, ...expected: readonly string[]): void {
  atCursor(title, files, ({ session, path, offset, lineOf }) => {
    const answer = renameEdits(session, path, offset, typed);
    assert.ok('edits' in answer, 'refused' in answer ? answer.refused : '');
    const lines = [...new Set(answer.edits.map((edit) => edit.path))].sort().flatMap((each) => {
      const after = editedText(session.text(each)!, answer.edits.filter((edit) => edit.path === each)).split(/\r?\n/);
      return [...new Set(answer.edits.filter((edit) => edit.path === each).map(({ span }) => session.text(each)!.slice(0, span.start).split('\n').length - 1))].map((line) => `${each}:${lineOf(each, line)} ${after[line]!.trim()}`);
    });
    assert.deepEqual(lines, expected);
  });
}

function refuses(title: string, files: Readonly<Record<string, string>>, typed: string, reason: RegExp): void {
  atCursor(title, files, ({ session, path, offset }) => {
    const answer = renameEdits(session, path, offset, typed);
    assert.match('refused' in answer ? answer.refused : JSON.stringify(answer), reason);
  });
}

/** Refused before a new name is asked for. */
function cannot(title: string, files: Readonly<Record<string, string>>, reason: RegExp): void {
  refuses(title, files, 'X', reason);
  atCursor(`${title}, before a name is typed`, files, ({ session, path, offset }) => {
    const target = renameTarget(session, path, offset);
    assert.match('refused' in target ? target.refused : JSON.stringify(target), reason);
  });
}

describe('rename', () => {
  becomes('a net, from a trace, in the file that declares it and wherever it is named', board(rest.replace('trace A', 'trace <|>A')), 'VALVE',
    'board.quiet:4 trace VALVE 0.2 mm; gap 0.2 mm', 'board.quiet:8 loop l on TOP { carries VALVE; circle 9 mm; over GND }', 'board.quiet:9 return ret { measured 1 mohm; carries VALVE; refers "B 1" }',
    'board.quiet:10 link body { between VALVE and "B 1"; mutual 1 nH }', 'parts/nets.quiet:2 net VALVE { swing 1 V; rise 1 ns; switches with G }');
  becomes('a quoted net to a bare one, its waiver with it', board(rest.replace('refers "B', 'refers "<|>B')), 'RX',
    'board.quiet:5 trace RX 0.2 mm; gap 0.2 mm', 'board.quiet:9 return ret { measured 1 mohm; carries A; refers RX }', 'board.quiet:10 link body { between A and RX; mutual 1 nH }',
    'board.quiet:11 shield lid { covers RX; covers l; sheet copper 1 mm; slot 1 mm; grounded }', 'board.quiet:12 waive over-budget on RX because "A is quiet then"', 'parts/nets.quiet:3 net RX { tolerates 1 mV peak; samples 1 ns after G }');
  becomes('a loop to a name that needs quotes', board(rest.replace('loop l', 'loop <|>l')), 'the loop, "big"',
    'board.quiet:8 loop "the loop, ""big""" on TOP { carries A; circle 9 mm; over GND }', 'board.quiet:11 shield lid { covers "B 1"; covers "the loop, ""big"""; sheet copper 1 mm; slot 1 mm; grounded }');
  becomes('a layer', board(rest.replace('loop l on TOP', 'loop l on T<|>OP')), 'L1',
    'board.quiet:3 run r on L1 for 9 mm {', 'board.quiet:8 loop l on L1 { carries A; circle 9 mm; over GND }', 'layers.quiet:1 stackup { copper L1 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }');
  becomes('a plane', board(rest.replace('over GND', 'over <|>GND')), 'L2', 'board.quiet:8 loop l on TOP { carries A; circle 9 mm; over L2 }', 'layers.quiet:1 stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane L2 18 um }');
  becomes('a family', { ...board(rest), 'parts/nets.quiet': nets.replace('family fast', 'family <|>fast') }, 'quick', 'parts/nets.quiet:1 family quick is lvcmos33 { swing 1 V }', 'parts/nets.quiet:4 net D[0..3] is quick');
  becomes('a group, which is declared by being named', { ...board(rest), 'parts/nets.quiet': nets.replace('after G', 'after <|>G') }, 'GATES',
    'parts/nets.quiet:2 net A { swing 1 V; rise 1 ns; switches with GATES }', 'parts/nets.quiet:3 net "B 1" { tolerates 1 mV peak; samples 1 ns after GATES }');
  becomes('guards of one name', { 'board.quiet': `${layers}net A { once }\nrun r on TOP for 9 mm { guard <|>GND 1 mm; gap 1 mm; trace A 1 mm; gap 1 mm; guard GND 1 mm }\n` }, 'AGND', 'board.quiet:3 run r on TOP for 9 mm { guard AGND 1 mm; gap 1 mm; trace A 1 mm; gap 1 mm; guard AGND 1 mm }');
  for (const [what, text, after] of [['a run', 'run r', 'run x'], ['a return', 'return ret', 'return x'], ['a link', 'link body', 'link x'], ['a shield', 'shield lid', 'shield x']] as const) {
    const at = rest.split('\n').findIndex((line) => line.startsWith(text));
    becomes(what, board(rest.replace(text, `${text}<|>`)), 'x', `board.quiet:${at + 3} ${rest.split('\n')[at]!.replace(text, after)}`);
  }
  for (const [what, text] of [['a board', 'board <|>b { combine rss }'], ['a stackup', 'stackup <|>b { copper TOP 35 um }'], ['an ambient', 'ambient <|>b { field 1 V/m from 1 MHz to 2 MHz }'], ['a pair', 'net P { once }\npair <|>b { plus P }']] as const) {
    becomes(what, { 'board.quiet': `${text}\n` }, 'x', `board.quiet:${text.split('\n').length} ${text.split('\n').at(-1)!.replace('<|>b', 'x')}`);
  }
  becomes('a range, as a range', board(rest.replace('trace D[0..3]', 'trace D[<|>0..3]')), 'BUS[0..3]', 'board.quiet:6 trace BUS[0..3] 0.1 mm spaced 0.1 mm', 'parts/nets.quiet:4 net BUS[0..3] is fast');
  becomes('single names and parts of a range with it', { 'board.quiet': `net <|>D[0..7]_N { once }\nreturn r { measured 1 ohm; carries D[7..6]_N; carries D3_N; refers D[0..1]_N }\n` }, 'X[8..15]', 'board.quiet:1 net X[8..15] { once }', 'board.quiet:2 return r { measured 1 ohm; carries X[15..14]; carries X11; refers X[8..9] }');
  becomes('names in brackets with a range of them', { 'board.quiet': 'net <|>D[[0..3]] { once }\nlink l { between D[0] and D[2]; mutual 1 nH }\n' }, 'E[[0..3]]', 'board.quiet:1 net E[[0..3]] { once }', 'board.quiet:2 link l { between E[0] and E[2]; mutual 1 nH }');
  becomes('quotes that nobody needs stay', { 'board.quiet': 'net "<|>A" { once }\nlink l { between A and "A"; mutual 1 nH }\n' }, 'B', 'board.quiet:1 net "B" { once }', 'board.quiet:2 link l { between B and "B"; mutual 1 nH }');
  becomes('typed quotes are quotes', { 'board.quiet': 'net <|>A { once }\n' }, '"B 1"', 'board.quiet:1 net "B 1" { once }');
  becomes('to what looks like a range, in quotes', { 'board.quiet': 'net <|>A { once }\n' }, '"B[0..1]"', 'board.quiet:1 net "B[0..1]" { once }');
  becomes('to the same name changes nothing', { 'board.quiet': 'net <|>A { once }\n' }, ' A ');
  becomes('a name of two-unit characters', { 'board.quiet': 'net "µΩ 🔌" { once }\nlink l { between "µΩ 🔌" and "µΩ<|> 🔌"; mutual 1 nH }\n' }, '🔌Ω', 'board.quiet:1 net 🔌Ω { once }', 'board.quiet:2 link l { between 🔌Ω and 🔌Ω; mutual 1 nH }');
  becomes('to a word of the language', { 'board.quiet': 'net <|>A { once }\nlink l { between A and A; mutual 1 nH }\n' }, 'and', 'board.quiet:1 net and { once }', 'board.quiet:2 link l { between and and and; mutual 1 nH }');
  becomes('to __proto__, which is a name like any other', { 'board.quiet': 'net <|>A { once }\n' }, '__proto__', 'board.quiet:1 net __proto__ { once }');
  becomes('both declarations of a name that is declared twice', { 'board.quiet': 'net A { once }\nnet A { once }\nlink l { between <|>A and A; mutual 1 nH }\n' }, 'B', 'board.quiet:1 net B { once }', 'board.quiet:2 net B { once }', 'board.quiet:3 link l { between B and B; mutual 1 nH }');
  becomes('what stands in a statement that is stated twice', { 'board.quiet': 'net <|>A { once }\nnet B { once }\npair p { plus B; minus B; minus A }\n' }, 'C', 'board.quiet:1 net C { once }', 'board.quiet:3 pair p { plus B; minus B; minus C }');
  becomes('every project that sees it, from one of them', { 'a.quiet': 'use "fam.quiet"\nnet A is <|>f\n', 'b.quiet': 'use "fam.quiet"\nnet B is f\n', 'c.quiet': 'family f { once }\nnet C is f\n', 'fam.quiet': 'family f { swing 1 V }\n' }, 'g', 'a.quiet:2 net A is g', 'b.quiet:2 net B is g', 'fam.quiet:1 family g { swing 1 V }');
  becomes('a net, from the guard that has its name', { 'board.quiet': `${layers}net GND { once }\nrun r on TOP for 9 mm { guard <|>GND 1 mm }\n` }, 'V', 'board.quiet:2 net V { once }', 'board.quiet:3 run r on TOP for 9 mm { guard V 1 mm }');
  becomes('a net and the guard of that name, which is its own, and not the plane or the run', { 'board.quiet': `${layers}net <|>GND { once }\nrun GND on TOP for 9 mm { trace GND 1 mm; gap 1 mm; guard GND 1 mm }\n` }, 'V', 'board.quiet:2 net V { once }', 'board.quiet:3 run GND on TOP for 9 mm { trace V 1 mm; gap 1 mm; guard V 1 mm }');
});

describe('rename refuses', () => {
  cannot('a built-in family', { 'board.quiet': 'net A is lvc<|>mos33\n' }, /lvcmos33 is built into the language/);
  cannot('a keyword', { 'board.quiet': 'net A { sw<|>ing 1 V }\n' }, /No name .* stands here/);
  cannot('a name that nothing declares', { 'board.quiet': 'net A is nob<|>ody\n' }, /No name/);
  cannot('one of a range', { 'board.quiet': 'net D[0..3] { once }\nlink l { between <|>D1 and D2; mutual 1 nH }\n' }, /D1 is part of D\[0\.\.3\] \(board\.quiet, line \d\)/);
  cannot('a part of a range', { 'board.quiet': 'net D[0..3] { once }\nreturn r { measured 1 ohm; carries D[0<|>..1] }\n' }, /D\[0\.\.1\] is part of D\[0\.\.3\]/);
  cannot('what also stands in a line that cannot be read', { 'board.quiet': `${layers}net A<|> { once }\nrun r on TOP for 1 mm { trac A 1 mm }\n` }, /A also stands in a line that could not be read \(board\.quiet, line \d\)/);
  cannot('the subject of a waiver that is a net and a run', { 'board.quiet': `${layers}net A { once }\nrun A on TOP for 1 mm { trace A 1 mm }\nwaive over-budget on <|>A because "x"\n` }, /A names a net and a run here/);
  refuses('a name that is taken, by another kind of one set', { 'board.quiet': 'net A<|> { once }\nloop B { circle 9 mm }\n' }, 'B', /There is a loop B already \(board\.quiet, line \d\)/);
  refuses('a name that is taken in another project', { 'a.quiet': 'use "n.quiet"\nnet B { once }\n', 'b.quiet': 'use "n.quiet"\nlink l { between <|>A and A; mutual 1 nH }\n', 'n.quiet': 'net A { once }\n' }, 'B', /There is a net B already \(a\.quiet, line 2\)/);
  refuses('the name of a built-in family', { 'board.quiet': 'family <|>f { once }\nnet A is ttl\n' }, 'ttl', /ttl is a family that is built into the language/);
  refuses('to make two groups one', { 'board.quiet': 'net A { switches with <|>G }\nnet B { switches with H }\n' }, 'H', /two would become one/);
  refuses('a name that is used without a declaration', { 'board.quiet': 'net <|>A { once }\nlink l { between A and B; mutual 1 nH }\n' }, 'B', /B stands on the board already, though nothing declares it/);
  refuses('to give a guard the name of a net', { 'board.quiet': `${layers}net A { once }\nrun r on TOP for 9 mm { trace A 1 mm; gap 1 mm; guard <|>GND 1 mm }\n` }, 'A', /There is a net A already/);
  refuses('to give a net the name of a guard', { 'board.quiet': `${layers}net A<|> { once }\nrun r on TOP for 9 mm { trace A 1 mm; gap 1 mm; guard GND 1 mm }\n` }, 'GND', /GND stands on the board already/);
  refuses('an empty name', { 'board.quiet': 'net <|>A { once }\n' }, '  ', /may not be empty/);
  refuses('a name of two lines', { 'board.quiet': 'net <|>A { once }\n' }, 'B\nC', /B C is no name/);
  refuses('a range for one name', { 'board.quiet': 'net <|>A { once }\n' }, 'B[0..1]', /B\[0\.\.1\] is a range of names, and A is one/);
  refuses('one name for a range', { 'board.quiet': 'net <|>D[0..3] { once }\n' }, 'B', /D\[0\.\.3\] is 4 names.*B\[0\.\.3\]/);
  refuses('a range of another size', { 'board.quiet': 'net <|>D[0..3] { once }\n' }, 'B[0..2]', /B\[0\.\.2\] is 3 names, D\[0\.\.3\] is 4/);
});

describe('rename beside a waiver', () => {
  const noisy = `${layers}net N { swing 5 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }\nnet V { source 100 ohm; load 1 kohm, 10 pF; tolerates 1 mV peak }\nrun V on TOP for 20 mm { trace N 0.15 mm; gap 0.5 mm; trace V 0.15 mm }\n`;
  becomes('follows with the net whose finding it hides', { 'board.quiet': `${noisy.replace('net V', 'net <|>V')}waive over-budget on V because "x"\nwaive dominant-coupling on V because "x"\n` }, 'RX',
    'board.quiet:3 net RX { source 100 ohm; load 1 kohm, 10 pF; tolerates 1 mV peak }', 'board.quiet:4 run V on TOP for 20 mm { trace N 0.15 mm; gap 0.5 mm; trace RX 0.15 mm }', 'board.quiet:5 waive over-budget on RX because "x"');
  becomes('and with the run', { 'board.quiet': `${noisy.replace('run V', 'run <|>V')}waive over-budget on V because "x"\nwaive dominant-coupling on V because "x"\n` }, 'alley',
    'board.quiet:4 run alley on TOP for 20 mm { trace N 0.15 mm; gap 0.5 mm; trace V 0.15 mm }', 'board.quiet:6 waive dominant-coupling on alley because "x"');
  refuses('a name on which a waiver would hide a finding', { 'board.quiet': `${noisy.replace('net V', 'net <|>V')}family F { once }\nnet X is F\nwaive over-budget on F because "x"\n` }, 'F', /A waiver of over-budget stands on F already/);
});

it('offers the name without quotes, over all of what stands in the text', () => {
  const session = new Session();
  session.setText('board.quiet', 'net "B 1" { once }\n');
  assert.deepEqual(renameTarget(session, 'board.quiet', 5), { span: { start: 4, end: 9 }, name: 'B 1' });
});
