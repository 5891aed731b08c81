/** `quietrun compare`: what it prints, and when it fails. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { commandLine } from './commandLine';

const { put, quietrun } = commandLine();

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = (gap: string) => `use "parts/stack.quiet"
net CLK { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 200 ohm; load 1 Mohm, 8 pF; tolerates 5 mV peak }
run r on TOP for 20 mm { trace CLK 0.2 mm; gap ${gap}; trace SENSE 0.2 mm }
`;
put('old/parts/stack.quiet', stackup);
put('new/parts/stack.quiet', stackup.replace('0.2 mm', '0.15 mm'));
put('old/b.quiet', board('1.5 mm'));
put('new/b.quiet', board('1 mm'));
put('worse/parts/stack.quiet', stackup);
put('worse/b.quiet', board('0.2 mm'));

describe('quietrun compare', () => {
  it('says what changed, also in a file that is used, and what that did', async () => {
    const { code, out, complaints } = await quietrun(['compare', 'old/b.quiet', 'new/b.quiet']);
    assert.equal(complaints, '');
    assert.equal(code, 0);
    assert.match(out, /^old\/b\.quiet → new\/b\.quiet\n\n2 declarations have changed:\n {2}/);
    assert.match(out, /\n {2}run r: gap 1\.5 mm → 1 mm\n/);
    assert.match(out, /\n {2}stackup: prepreg 0\.2 mm er 4\.2 → 0\.15 mm er 4\.2\n/);
    assert.match(out, /\n {2}SENSE {2}[\d.]+ [mµ]V → [\d.]+ [mµ]V of 5\.00 mV peak {2}-?[\d.]+ dB → -?[\d.]+ dB\n {4} *[+−][\d.]+ [mµ]V {2}/);
  });

  it('fails where a margin is lost that was there, and only there', async () => {
    const lost = await quietrun(['compare', 'old/b.quiet', 'worse/b.quiet']);
    assert.equal(lost.code, 1);
    assert.match(lost.out, /now over/);
    assert.equal((await quietrun(['compare', 'worse/b.quiet', 'old/b.quiet'])).code, 0);
    const same = await quietrun(['compare', 'worse/b.quiet', 'worse/b.quiet']);
    assert.deepEqual([same.code, same.out], [0, 'worse/b.quiet → worse/b.quiet\n\nNothing that is declared has changed.\n\nNo margin has moved.\n']);
  });

  it('writes the comment on a merge request', async () => {
    const { out } = await quietrun(['compare', 'old/b.quiet', 'worse/b.quiet', '--format', 'markdown']);
    assert.match(out, /^### Noise margins: old\/b\.quiet → worse\/b\.quiet\n\n\| net \| total/);
    assert.match(out, /\| SENSE \| .* \| \*\*now over\*\* \| \+[\d.]+ mV run r: gap 1\.5 mm → 0\.2 mm \|/);
  });

  it('compares what can be read, and says that it was not all', async () => {
    put('broken/b.quiet', board('1 mm'));
    const { code, complaints } = await quietrun(['compare', 'old/b.quiet', 'broken/b.quiet']);
    assert.equal(code, 1);
    assert.match(complaints, /broken\/b\.quiet could not be read whole/);
  });

  for (const [words, why] of [['compare', 'compare takes two files, the old one first'], ['compare a', 'compare takes two files, the old one first'], ['compare a b', 'there is no file a'], ['compare old/b.quiet b', 'there is no file b'], ['compare a b --format html', '--format takes text or markdown, not html']] as const) {
    it(`says what is wrong with: ${words}`, async () => {
      const { code, complaints } = await quietrun(words.split(' '));
      assert.equal(code, 2);
      assert.ok(complaints.startsWith(`quietrun: ${why}\n`), complaints);
    });
  }
});
