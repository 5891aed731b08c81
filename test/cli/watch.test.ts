/** `quietrun check --watch`, with files that change while it watches. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { commandLine } from './commandLine';

const { put, quietrun } = commandLine();

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = (gap: string) => `use "stack.quiet"
net CLK { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 200 ohm; load 1 Mohm, 8 pF; tolerates 5 mV peak }
run r on TOP for 20 mm { trace CLK 0.2 mm; gap ${gap}; trace SENSE 0.2 mm }
`;

/** Does one thing after the other, each when the watch has begun to wait again, then stops it. */
async function watched(...steps: readonly (() => void)[]) {
  const stop = new AbortController();
  const left = [...steps];
  // Beyond the moment in which a date could be that of the check itself.
  const next = () => setTimeout(() => (left.length === 0 ? stop.abort() : left.shift()!()), 30);
  return quietrun(['check', 'b.quiet', '--watch'], '', { stop: stop.signal, heard: (text) => { if (text.includes('Watching')) next(); } });
}

const reports = (out: string) => out.split(/^b\.quiet$/m).length - 1;

describe('quietrun check --watch', () => {
  it('checks again when the board changes, and ends with the last status', async () => {
    put('stack.quiet', stackup);
    put('b.quiet', board('3 mm'));
    const { code, out, complaints } = await watched(() => put('b.quiet', board('0.2 mm')));
    assert.equal(code, 1);
    assert.ok(2 <= reports(out), out);
    assert.match(out, /No findings[\s\S]*error\[over-budget\]/);
    assert.match(complaints, /Watching 2 files; Ctrl-C ends\./);
  });

  it('checks again when a file that is used changes, goes, and comes back', async () => {
    put('stack.quiet', stackup);
    put('b.quiet', board('3 mm'));
    const { code, out } = await watched(() => put('stack.quiet', stackup.replace('0.2 mm', 'nothing')), () => put('stack.quiet', stackup));
    assert.equal(code, 0);
    assert.match(out, /No findings[\s\S]*error\[[\s\S]*No findings[^\n]*\n$/);
  });

  it('waits for a file that is not there yet', async () => {
    const stop = new AbortController();
    let count = 0;
    const { code, complaints } = await quietrun(['check', 'later.quiet', '--watch'], '', {
      stop: stop.signal,
      heard: (text) => { if (text.includes('Watching')) setTimeout(() => ((count += 1) === 1 ? put('later.quiet', stackup) : stop.abort()), 30); },
    });
    assert.equal(code, 0);
    assert.match(complaints, /there is no file later\.quiet/);
  });

  it('does nothing while nothing changes', async () => {
    put('stack.quiet', stackup);
    put('b.quiet', board('3 mm'));
    await new Promise((resolve) => setTimeout(resolve, 30));
    const stop = new AbortController();
    setTimeout(() => stop.abort(), 1500);
    const { out } = await quietrun(['check', 'b.quiet', '--watch'], '', { stop: stop.signal });
    assert.equal(reports(out), 1);
  });
});
