import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import { createSolveCache } from '../../server/src/budget/solveCache';
import { couplingOf, evaluated, microstrip } from './board';

const nets = (rise: string) => `net A { swing 3.3 V; rise ${rise}; source 10 ohm; load 100 ohm }\nnet V { source 1 ohm; load 100 ohm; tolerates 1 V peak }\n`;
const row = (guard: string) => `run r on TOP for 40 mm { trace A 0.2 mm; gap 0.3 mm; ${guard}; gap 0.3 mm; trace V 0.2 mm }\n`;

describe('guards', () => {
  it('hold while their ties are closer than a twentieth of the wavelength at the knee', () => {
    const loose = (rise: string, guard: string) => evaluated(microstrip + nets(rise) + row(guard)).runs[0].looseGuards;
    // 1 ns: 350 MHz at about 5.5 ns/m, so 26 mm; the run is 40 mm.
    const [tiedAtEnds] = loose('1 ns', 'guard GND 0.25 mm');
    near(tiedAtEnds.spacing, 0.04, 1e-12);
    const delay = Math.max(...evaluated(microstrip + nets('1 ns') + row('guard GND 0.25 mm')).runs[0].delay);
    near(tiedAtEnds.largest, 1 / (20 * 350e6 * delay), 1e-9);
    assert.deepEqual(loose('1 ns', 'guard GND 0.25 mm stitched 20 mm'), []);
    assert.deepEqual(loose('2 ns', 'guard GND 0.25 mm'), []);
    // Ties further apart than the run is long are those at its ends.
    near(loose('1 ns', 'guard GND 0.25 mm stitched 90 mm')[0].spacing, 0.04, 1e-12);
  });

  // In the reference cases of three lines an open guard is worse than none and one tied at its ends hardly helps.
  describe('whose ties do not hold', () => {
    const matched = 'net A { swing 3.3 V; rise 0.24 ns; source 50 ohm; load 50 ohm }\nnet V { source 50 ohm; load 50 ohm; tolerates 1 V peak }\n';
    const board = (guard: string) => evaluated(`${microstrip}${matched}run r on TOP for 100 mm { trace A 0.2 mm; gap 0.3 mm; ${guard}; gap 0.3 mm; trace V 0.2 mm }`);
    const noise = (guard: string) => Math.abs(couplingOf(board(guard), 'A', 'V').atReceiver);
    const bare = Math.abs(couplingOf(evaluated(`${microstrip}${matched}run r on TOP for 100 mm { trace A 0.2 mm; gap 0.85 mm; trace V 0.2 mm }`), 'A', 'V').atReceiver);

    it('are solved as lines: tied at its ends a guard does not help, and every tie between does', () => {
      const [ends, few, more, held] = ['', ' stitched 34 mm', ' stitched 11 mm', ' stitched 2 mm'].map((stitched) => noise(`guard GND 0.25 mm${stitched}`));
      assert.ok(0.9 * bare < ends, `${ends} with a guard tied at its ends, ${bare} without`);
      assert.ok(few < 0.7 * ends, `${few} of ${ends}`);
      assert.ok(held < 0.6 * bare, `${held} of ${bare}`);
      near(more, held, 0.25);
    });

    it('say so, with what they let through and what they would if they held', () => {
      const { assumptions } = couplingOf(board('guard GND 0.25 mm'), 'A', 'V');
      assert.ok(assumptions.some((words) => /solved as one more line, tied through vias of [\d.]+ pH \(drill of 0\.3 mm/.test(words)), assumptions.join('; '));
      assert.ok(!assumptions.some((words) => /counts as tied/.test(words)));
      const { past } = board('guard GND 0.25 mm').runs[0].looseGuards[0];
      near(past!.asTied, noise('guard GND 0.25 mm'), 1e-12);
      near(past!.stitched, noise('guard GND 0.25 mm stitched 2 mm'), 1e-9);
    });

    it('are solved again for their own ties only', () => {
      const cache = createSolveCache();
      const text = (stitched: string, other: string) => `${microstrip}${matched}run r on TOP for 100 mm { trace A 0.2 mm; gap 0.3 mm; guard GND 0.25 mm stitched ${stitched}; gap 0.3 mm; trace V 0.2 mm }\nrun s on TOP for ${other} { trace A 0.2 mm; gap 0.4 mm; guard GND 0.25 mm; gap 0.3 mm; trace V 0.2 mm }\n`;
      const first = evaluated(text('30 mm', '90 mm'), cache);
      const before = cache.work().linesSolved;
      const second = evaluated(text('20 mm', '90 mm'), cache);
      const added = cache.work().linesSolved - before;
      assert.ok(0 < added && added <= 2, `${added} lines`);
      const of = ({ runs: [run] }: typeof first) => Math.abs(run.couplings[0].atReceiver);
      assert.notEqual(of(first), of(second));
    });
  });

  it('are not judged where nothing moves, nor where they are the return', () => {
    const quiet = 'net A { source 10 ohm }\nnet V { source 1 ohm; tolerates 1 V peak }\n';
    assert.deepEqual(evaluated(microstrip + quiet + row('guard GND 0.25 mm')).runs[0].looseGuards, []);
    assert.deepEqual(evaluated(`stackup { copper TOP 35 um; core 1.5 mm er 4.5 }\n${nets('1 ns')}${row('guard GND 2 mm')}`).runs[0].looseGuards, []);
  });

  it('do not keep the flux of slow edges out: below their corner the larger of both counts', () => {
    const [fast, slow] = ['20 ns', '20 us'].map((rise) => couplingOf(evaluated(microstrip + nets(rise) + row('guard GND 0.25 mm')), 'A', 'V'));
    const said = /carry their balancing current/;
    assert.ok(!fast.assumptions.some((words) => said.test(words)));
    assert.ok(slow.assumptions.some((words) => said.test(words)));
    // A magnetic coupling across low impedances: with the guard currentless the mutual is nearly that of a bare gap as wide. Not
    // quite: without a net current its copper still keeps flux out of itself.
    const bare = couplingOf(evaluated(`${microstrip}${nets('20 us')}run r on TOP for 40 mm { trace A 0.2 mm; gap 0.85 mm; trace V 0.2 mm }`), 'A', 'V');
    near(slow.inductivePart, bare.inductivePart, 0.1);
    // And it is well above what an ideal guard leaves: the parts of a fast edge, scaled to this slope.
    assert.ok(1.4 * Math.abs(fast.inductivePart) * (20e-9 / 20e-6) < Math.abs(slow.inductivePart), `${fast.inductivePart} ${slow.inductivePart}`);
  });

  it('share a slow return current as their resistances do', () => {
    const board = 'stackup { copper TOP 35 um; core 1.5 mm er 4.5 }\n';
    const rows = (right: string) => `run r on TOP for 40 mm { return GND 1 mm; gap 0.3 mm; trace A 0.2 mm; gap 0.3 mm; trace V 0.2 mm; gap 0.3 mm; return GND ${right} }\n`;
    const slow = couplingOf(evaluated(board + nets('50 us') + rows('1 mm')), 'A', 'V');
    assert.ok(slow.assumptions.some((words) => /carry their balancing current/.test(words)));
    // Nearly all of the current in one return: as if the other were not there.
    const lopsided = couplingOf(evaluated(board + nets('50 us') + rows('0.001 mm')), 'A', 'V');
    const single = couplingOf(evaluated(`${board}${nets('50 us')}run r on TOP for 40 mm { return GND 1 mm; gap 0.3 mm; trace A 0.2 mm; gap 0.3 mm; trace V 0.2 mm }`), 'A', 'V');
    near(Math.abs(lopsided.inductivePart), Math.abs(single.inductivePart), 0.03);
  });
});
