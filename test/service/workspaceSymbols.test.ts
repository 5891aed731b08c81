/** Symbols of all files: found by letters in their order, the closest first, and never more than a thousand. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { closeness } from '../../server/src/service/closeness';
import { Session } from '../../server/src/service/session';
import { workspaceSymbols } from '../../server/src/service/workspaceSymbols';

const files: Readonly<Record<string, string>> = {
  'valve/board.quiet': 'use "../parts.quiet"\nboard valve { combine rss }\nrun valve-past-rx on TOP for 3 mm { trace VALVE_PWM 1 mm }\nnet VALVE_PWM is gate\nloop valve-switch { circle 1 mm }\nwaive over-budget on VALVE_PWM because "x"\n',
  'parts.quiet': 'stackup flex { copper TOP 35 um; plane GND 18 um }\nstackup { copper L1 35 um }\nfamily gate { once }\nnet D[0..31] is gate\nnet "RX IN" is gate\n',
};

function found(query: string): readonly string[] {
  const session = new Session();
  for (const [path, text] of Object.entries(files)) session.setText(path, text);
  return workspaceSymbols(session, query).map(({ name, container, path, span }) => {
    assert.equal(session.text(path)!.slice(span.start, span.end).replaceAll('"', ''), name);
    return `${name} ${container}`;
  });
}

describe('workspace symbols', () => {
  it('are all declarations where nothing is asked for', () => {
    assert.deepEqual(found(''), ['D[0..31] net', 'GND plane of stackup flex', 'L1 copper of stackup', 'RX IN net', 'TOP copper of stackup flex', 'VALVE_PWM net', 'flex stackup', 'gate family', 'valve board', 'valve-past-rx run', 'valve-switch loop']);
  });
  it('are found by letters in their order, the closest first', () => {
    assert.deepEqual(found('vpw'), ['VALVE_PWM net']);
    assert.deepEqual(found('valve'), ['valve board', 'VALVE_PWM net', 'valve-switch loop', 'valve-past-rx run']);
    assert.deepEqual(found('rx'), ['RX IN net', 'valve-past-rx run']);
    assert.deepEqual(found('zzz'), []);
  });
  it('are found by one of the names that a range stands for', () => assert.deepEqual(found('D17'), ['D[0..31] net']));
  it('are at most a thousand', () => {
    const session = new Session();
    session.setText('a.quiet', Array.from({ length: 3000 }, (_, at) => `net N${at} { once }`).join('\n'));
    assert.equal(workspaceSymbols(session, 'n').length, 1000);
    assert.equal(workspaceSymbols(session, 'N2999')[0]!.name, 'N2999');
  });
});

describe('closeness', () => {
  const closest = (query: string, ...names: readonly string[]) => [...names].sort((a, b) => closeness(query, b) - closeness(query, a));
  it('puts the whole name first, then its beginning, then the beginnings of its words', () => {
    assert.deepEqual(closest('rx', 'xrax', 'past-rx', 'rx-ground', 'RX', 'rx'), ['rx', 'RX', 'rx-ground', 'past-rx', 'xrax']);
    assert.deepEqual(closest('vp', 'evp', 'VALVE_SUP', 'VALVE_PWM', 'valvePwm'), ['valvePwm', 'VALVE_PWM', 'VALVE_SUP', 'evp']);
  });
  it('is none where the letters are not there in their order, and some wherever they are', () => {
    assert.equal(closeness('ba', 'ab'), -Infinity);
    const isWithin = (query: string, name: string) => {
      let at = -1;
      return [...query.toLowerCase()].every((letter) => 0 <= (at = name.toLowerCase().indexOf(letter, at + 1)));
    };
    const word = fc.string({ unit: fc.constantFrom('a', 'B', '_', '1', 'é', 'İ'), maxLength: 8 });
    fc.assert(fc.property(word, word, (query, name) => {
      assert.equal(closeness(query, name) !== -Infinity, query === '' || isWithin(query, name), `${query} in ${name}`);
    }), { numRuns: 3000 });
  });
});
