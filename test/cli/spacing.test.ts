/** `quietrun spacing`: its formats, its filters, and what it refuses. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { commandLine } from './commandLine';

const { put, quietrun } = commandLine();

const board = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net CLK { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }
net "=S|1" { source 200 ohm; load 1 Mohm, 8 pF; tolerates 5 mV peak }
net PUMP { swing 5 V; working 325 V peak; rise 3 ns; source 40 ohm; load 1 Mohm }
`;
put('b.quiet', board);
const few = ['spacing', 'b.quiet', '--gaps', '0.3mm', '--lengths=20mm', '--width', '0.2mm'];

describe('quietrun spacing', () => {
  it('prints a table with units, and what it rests on', async () => {
    const { code, out, complaints } = await quietrun(few);
    assert.equal(complaints, '');
    assert.equal(code, 0);
    const lines = out.split('\n');
    assert.equal(lines[0], 'b.quiet');
    assert.equal(lines[2], 'layer TOP');
    assert.match(lines[3], /longest at gap {2}gap for$/);
    assert.match(lines[4], /^ {2}from +to +widths +tolerated +room +0\.3 mm +20 mm$/);
    assert.match(lines[5], /^ {2}CLK +=S\|1 +0\.2 mm \/ 0\.2 mm +5\.00 mV peak +[\d.]+ mV +[\d.]+ mm +[\d.]+ mm$/);
    assert.ok(out.split('\n').every((line) => [...line].length <= 130));
  });

  it('gives no distance to what insulation depends on, and says whose business that is', async () => {
    const { out } = await quietrun(few);
    assert.doesNotMatch(out.split('\n\n')[1], /PUMP/);
    assert.match(out.replaceAll('\n', ' '), /No distance is given to PUMP, .* Quietrun does not judge insulation\..* a qualified person/);
  });

  it('writes CSV in SI, a line a number, of which no cell is a formula', async () => {
    const { out } = await quietrun([...few, '--format', 'csv']);
    const lines = out.split('\r\n');
    assert.equal(lines.length, 4);
    assert.equal(lines[0], 'layer,from,to,from width m,to width m,tolerated V,measure,room V,wanted,gap m,length m,found');
    assert.match(lines[1], /^TOP,CLK,'=S\|1,0\.0002,0\.0002,0\.005,peak,0\.00\d+,longest run,0\.0003,0\.0\d+,yes$/);
    assert.match(lines[2], /,smallest gap,0\.00\d+,0\.02,yes$/);
  });

  it('writes Markdown in which a name stays a name', async () => {
    const { out } = await quietrun([...few, '--format', 'markdown']);
    const rows = out.split('\n').filter((line) => line.startsWith('|'));
    assert.equal(rows.length, 3);
    assert.ok(rows.every((row) => row.replaceAll('\\|', '').split('|').length === 9), rows.join('\n'));
    assert.match(rows[2], /=S\\\|1/);
  });

  it('says where there is nothing to part', async () => {
    put('calm.quiet', 'net A { source 50 ohm; load 50 ohm }\n');
    const { code, out } = await quietrun(['spacing', 'calm.quiet']);
    assert.equal(code, 1);
    assert.match(out, /nothing swings, or nothing tolerates/);
  });

  it('keeps to the layer and the nets that are asked for', async () => {
    assert.equal((await quietrun([...few, '--layer', 'TOP', '--from', 'CLK', '--to', '=S|1'])).code, 0);
  });

  for (const [words, why] of [
    ['spacing', 'spacing of which file?'],
    ['spacing a b', 'spacing takes one file'],
    ['spacing b.quiet --gaps 0.3', '--gaps takes lengths such as 0.15mm,0.3mm, not 0.3'],
    ['spacing b.quiet --gaps 0.3mm,-1mm', '--gaps takes lengths such as 0.15mm,0.3mm, not 0.3mm,-1mm'],
    ['spacing b.quiet --width 1mm,2mm', '--width takes a length such as 0.15mm, not 1mm,2mm'],
    ['spacing b.quiet --format json', '--format takes text or csv or markdown, not json'],
    ['spacing b.quiet --placed=yes', '--placed takes nothing'],
  ] as const) {
    it(`says what is wrong with: ${words}`, async () => {
      const { code, complaints } = await quietrun(words.split(' '));
      assert.equal(code, 2);
      assert.ok(complaints.startsWith(`quietrun: ${why}\n`), complaints);
    });
  }

  for (const [option, name, why] of [['--layer', 'TPO', 'there is no layer TPO in b.quiet'], ['--to', 'NONE', 'there is no net NONE in b.quiet']] as const) {
    it(`refuses ${option} ${name}`, async () => {
      assert.deepEqual(await quietrun(['spacing', 'b.quiet', option, name]), { code: 2, out: '', complaints: `quietrun: ${why}\n` });
    });
  }
});
