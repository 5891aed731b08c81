/** Shields in budgets: on fields and between loops, never elsewhere; what floats; what both lie under. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import { budgetOf, evaluated, microstrip } from './board';

const value = (text: string, channel: string) => budgetOf(evaluated(text), 'V').contributions.filter((each) => each.channel === channel).reduce((sum, each) => sum + each.value, 0);
const receiver = 'net V { source 0 ohm; load 1 Gohm; tolerates 1 V peak }\n';
const shield = (more = 'grounded', covers = 'covers V') => `shield lid { ${covers}; sheet tin 0.2 mm; slot 6 mm; ${more} }\n`;

describe('a shield', () => {
  const field = `${receiver}loop in { senses V; rectangle 10 mm by 10 mm }\nambient radio { field 10 V/m from 100 MHz to 100 MHz }\n`;
  it('lets of a field through what its slot does: twice its length over the wavelength', () => {
    near(value(field + shield(), 'radiated') / value(field, 'radiated'), (2 * 6e-3 * 100e6) / 299792458, 1e-3);
  });

  it('does nothing against a field while it floats', () => {
    near(value(field + shield('floating'), 'radiated'), value(field, 'radiated'), 1e-9);
    assert.ok(budgetOf(evaluated(field + shield('floating')), 'V').contributions.some(({ assumptions }) => assumptions.some((words) => words.startsWith('shield lid floats'))));
  });

  const loops = `net A { current 1 A rise 8 ns }\n${receiver}loop out { carries A; rectangle 10 mm by 10 mm; wire 0.5 mm }\nloop in { senses V; rectangle 10 mm by 10 mm at (14 mm, 0 mm); wire 0.5 mm }\n`;
  it('acts between a loop under it and one that is not, and not between two under it', () => {
    const open = value(loops, 'loop');
    const over = value(loops + shield(), 'loop');
    assert.ok(over < 0.2 * open && 0 < over, `${over} of ${open}`);
    near(value(loops + shield('grounded', 'covers V; covers A'), 'loop'), open, 1e-12);
    near(value(loops + shield('grounded', 'covers out'), 'loop'), over, 1e-9);
  });

  it('acts on no run', () => {
    const run = `${microstrip}${receiver}net A { swing 3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nrun r on TOP for 20 mm { trace A 0.2 mm; gap 0.3 mm; trace V 0.2 mm }\n`;
    near(value(run + shield(), 'coupled'), value(run, 'coupled'), 1e-12);
  });

  it('with a slot of half a wavelength is none', () => {
    near(value(field + shield().replace('slot 6 mm', 'slot 1.5 m'), 'radiated'), value(field, 'radiated'), 1e-9);
  });
});
