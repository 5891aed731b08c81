import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
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
