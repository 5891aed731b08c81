/** A search for a run's numbers counts what loops, returns and links put on its receivers, and stumbles over none of them. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { fixesFor } from '../../server/src/fixes/index';
import { rootPath } from '../support/evaluated';
import { fixing } from '../support/fixing';

const run = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um }
net CLOCK { swing 3.3 V; rise 3 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { source 200 ohm; load 10 kohm, 8 pF; tolerates 20 mV peak }
run beside on TOP for 30 mm { trace CLOCK 0.15 mm; gap 0.30 mm; trace SENSE 0.15 mm }
`;

function gapFix(text: string): string {
  const { findings, context } = fixing(new Map([[rootPath, text]]));
  assert.deepEqual(context.project.errors, []);
  const over = findings.find(({ rule, subject }) => rule === 'over-budget' && subject?.name === 'SENSE')!;
  return fixesFor(over, context).find(({ title }) => title.startsWith('Widen'))?.title ?? 'none';
}

describe('a gap that is solved for beside other ways', () => {
  const alone = gapFix(run);

  it('is not touched by ways of nets that lie elsewhere', () => {
    const others = `net MOTOR { swing 12 V; rise 100 ns; source 5 ohm; load 1 kohm }
net FAR { source 1 kohm; load 1 Mohm; tolerates 5 V peak }
pair P { plus P_P; minus P_M; tolerates 5 V peak }
net P_P { source 50 ohm; load 50 ohm }
net P_M { source 50 ohm; load 50 ohm }
loop out on TOP { carries MOTOR; rectangle 20 mm by 9 mm; strip 1 mm }
loop in on TOP { senses P; rectangle 10 mm by 3 mm at (24 mm, 0 mm); wire 0.3 mm }
return ground { strip 30 mm by 1.5 mm on TOP; carries MOTOR; refers FAR }
link body { between MOTOR and FAR; capacitance 0.2 pF }
`;
    assert.match(alone, /^Widen the gap to 0\.\d+ mm: /);
    assert.equal(gapFix(run + others), alone);
  });

  it('is larger where another way takes part of what is tolerated', () => {
    const width = (title: string) => Number(/to ([\d.]+) mm/.exec(title)![1]);
    const linked = gapFix(`${run}net MOTOR { swing 12 V; rise 100 ns; source 5 ohm; load 1 kohm }\nlink body { between MOTOR and SENSE; capacitance 0.05 pF }\n`);
    assert.ok(width(alone) < width(linked), `${alone}; ${linked}`);
  });
});
