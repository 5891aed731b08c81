/** What is assumed where nothing is stated (language reference, "net"). */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import { couplingOf, evaluated, microstrip } from './board';

const run = 'run r on TOP for 30 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm }\n';
const received = (nets: string, rows = run) => Math.abs(couplingOf(evaluated(`${microstrip}${nets}\n${rows}`), 'A', 'V').atReceiver);

const driver = 'net A { swing 3.3 V; rise 1 ns; source 20 ohm; load 1 kohm, 8 pF }\n';
const listener = 'net V { source 100 ohm; load 10 kohm, 10 pF; tolerates 1 V peak }\n';

describe('ends that are not stated', () => {
  it('of a driver are 10 Ω, and 1 MΩ with 5 pF', () => {
    const stated = received(`net A { swing 3.3 V; rise 1 ns; source 10 ohm; load 1 Mohm, 5 pF }\n${listener}`);
    assert.equal(received(`net A { swing 3.3 V; rise 1 ns }\n${listener}`), stated);
  });

  it('of a receiver’s source are 0 Ω and 1 MΩ, and the larger counts', () => {
    const withSource = (source: string) => received(`${driver}net V { source ${source}; load 10 kohm, 10 pF; tolerates 1 V peak }`);
    const unstated = received(`${driver}net V { load 10 kohm, 10 pF; tolerates 1 V peak }`);
    assert.equal(unstated, Math.max(withSource('0 ohm'), withSource('1 Mohm')));
  });

  it('of a net that is neither are its own characteristic resistance', () => {
    const rows = 'run r on TOP for 60 mm { trace A 0.2 mm; gap 0.3 mm; trace N 0.2 mm; gap 0.3 mm; trace V 0.15 mm }';
    const evaluation = evaluated(`${microstrip}${driver}${listener}net N { length 60 mm }\n${rows}`);
    const own = evaluation.runs[0].impedance[1];
    const stated = received(`${driver}${listener}net N { source ${own} ohm; load ${own} ohm }`, rows);
    near(Math.abs(couplingOf(evaluation, 'A', 'V').atReceiver), stated, 1e-9);
  });

  it('of a net that drives and listens are those of either while it does', () => {
    // While V listens its driver is not known to hold it; while it drives it is 10 Ω.
    const both = `${driver}net V { swing 3.3 V; rise 1 ns; load 10 kohm, 10 pF; tolerates 1 V peak }`;
    assert.equal(received(both), received(`${driver}net V { load 10 kohm, 10 pF; tolerates 1 V peak }`));
    const reverse = couplingOf(evaluated(`${microstrip}${both.replace('8 pF }', '8 pF; tolerates 1 V peak }')}\n${run}`), 'V', 'A');
    const stated = couplingOf(evaluated(`${microstrip}${driver.replace('8 pF }', '8 pF; tolerates 1 V peak }')}net V { swing 3.3 V; rise 1 ns; source 10 ohm; load 10 kohm, 10 pF }\n${run}`), 'V', 'A');
    assert.equal(reverse.atReceiver, stated.atReceiver);
  });

  it('are told, once for a net, where it couples', () => {
    const text = `${microstrip}net A { swing 3.3 V; rise 1 ns }\nnet V { tolerates 1 V peak }\nnet N { length 40 mm }\nnet FAR { swing 1 V; rise 1 ns }
      run r on TOP for 30 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm; gap 0.3 mm; trace N 0.2 mm }
      run s on TOP for 30 mm { trace A 0.2 mm; gap 0.5 mm; trace V 0.15 mm }
      run alone on TOP for 10 mm { trace FAR 0.2 mm; gap 0.5 mm; trace N 0.15 mm }`;
    assert.deepEqual(evaluated(text).assumedEnds.map(({ net, missing, assumed }) => `${net.name} ${missing}: ${assumed}`), [
      'A source: 10.0 Ω',
      'A load: 1 MΩ and 5 pF',
      'V source: both 0 Ω and 1 MΩ; the larger result counts',
      'V load: 1 MΩ and 5 pF',
      'N source: its own characteristic resistance',
      'N load: its own characteristic resistance',
    ]);
  });

  it('leave out what lies outside the run unless the net states its length', () => {
    const lead = (length: string, after: string) => couplingOf(evaluated(`${microstrip}${driver}${listener.replace('tolerates', `${length} tolerates`)}run r on TOP for 30 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.15 mm ${after} }`), 'A', 'V');
    const none = lead('', '').atReceiver;
    assert.equal(lead('length 30 mm;', '').atReceiver, none);
    const half = lead('length 60 mm;', '');
    assert.notEqual(half.atReceiver, none);
    assert.equal(lead('length 60 mm;', 'after 15 mm').atReceiver, half.atReceiver);
    assert.notEqual(lead('length 60 mm;', 'after 0 mm').atReceiver, half.atReceiver);
    assert.ok(half.assumptions.some((words) => words === '15 mm of V before the run and 15 mm after it count as uncoupled line'), half.assumptions.join('\n'));
  });
});
