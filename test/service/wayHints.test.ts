/** The numbers in grey of loops, returns and links: each `«…»` stands where its hint does. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { hints } from '../../server/src/service/hints';
import { Session } from '../../server/src/service/session';

const nets = `stackup { copper TOP 35 um; prepreg 0.4 mm er 4.2; plane GND1 18 um }
net VALVE { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
net SENSE { source 1 kohm; load 1 Mohm, 8 pF; tolerates 10 mV peak }
net D0 { source 1 kohm; load 1 Mohm; tolerates 100 mV peak }
net D1 { source 1 kohm; load 1 Mohm; tolerates 100 mV peak }
`;
const loops = `loop out on TOP { carries VALVE; rectangle 22 mm by 9 mm; strip 1 mm; area at most 120 mm2 }
loop in on TOP { senses SENSE; rectangle 14 mm by 3 mm at (24 mm, 0 mm) }
`;

function shown(text: string): string {
  const session = new Session();
  session.setText('b', text);
  let from = 0;
  let result = '';
  for (const { offset, parts } of hints(session, 'b', { start: 0, end: text.length })) {
    result += `${text.slice(from, offset)}«${parts.map((part) => part.text).join('')}»`;
    from = offset;
  }
  return (result + text.slice(from)).slice(nets.length);
}

describe('inlay hints of other ways', () => {
  it('say of loops how large they are, what they sense, and what their current puts on whom', () => {
    assert.match(shown(nets + loops), /^loop out on TOP \{ carries VALVE«≈ (\S+) mV on SENSE · (\d+) %»; rectangle 22 mm by 9 mm«198 mm² · 4\d\.\d nH»; strip 1 mm; area at most 120 mm2 \}\nloop in on TOP \{ senses SENSE«≈ \1 mV · \2 %»; rectangle 14 mm by 3 mm at \(24 mm, 0 mm\)«42 mm²» \}\n$/);
  });

  it('say of returns what an ampere drops, what each receiver gets, of a range once, and from whom', () => {
    assert.match(shown(`${nets}return ground { strip 30 mm by 1.5 mm on TOP; carries VALVE; refers D[0..1] }\n`),
      /^return ground«1\d\.\d mΩ · \d+\.\d nH» \{ strip 30 mm by 1\.5 mm on TOP; carries VALVE«≈ (\S+) V on D0 · (\d+) %»; refers D\[0\.\.1\]«≈ \1 V · \2 %» \}\n$/);
  });

  it('say of a link what it puts on whom', () => {
    assert.match(shown(`${nets}link body { between VALVE and SENSE  # across the slot\n  capacitance 0.2 pF }\n`), /between VALVE and SENSE«≈ \S+ mV on SENSE · \d+ %»  # across/);
  });

  it('are silent where nothing is heard, but for sizes', () => {
    assert.equal(shown(`${nets}loop alone on TOP { carries VALVE; circle 10 mm; wire 1 mm }\nlink body { between D0 and SENSE; capacitance 0.2 pF }\n`).replace(/ · [\d.]+ nH/, ''), 'loop alone on TOP { carries VALVE; circle 10 mm«78.5 mm²»; wire 1 mm }\nlink body { between D0 and SENSE; capacitance 0.2 pF }\n');
  });

  it('count what a field puts into the loop', () => {
    const share = (text: string) => Number(/senses SENSE«≈ .* · ([\d.]+) %»/.exec(shown(text))![1]);
    assert.ok(share(nets + loops) < share(`${nets}${loops}ambient radio { field 10 V/m from 80 MHz to 1 GHz }\n`));
  });

  it('lead to the receiver, to what it tolerates and to a limit; tooltips hold names as they are written', () => {
    const session = new Session();
    const text = (nets + loops).replaceAll('SENSE', '"a*b"');
    session.setText('b', text);
    const all = hints(session, 'b', { start: 0, end: text.length });
    const targets = (index: number) => all[index]!.parts.map(({ target }) => target && text.slice(target.span.start, target.span.end));
    assert.deepEqual(targets(0), ['"a*b"', '10 mV']);
    assert.deepEqual(targets(1), ['120 mm2', null]);
    assert.ok(all[0]!.tooltip.includes('**a\\*b**'), all[0]!.tooltip);
    assert.match(all[1]!.tooltip, /198 mm² of 120 mm² at most, 165 %/);
  });

  it('are those of the lines asked for', () => {
    const session = new Session();
    const text = nets + loops;
    session.setText('b', text);
    const start = text.indexOf('loop in');
    assert.equal(hints(session, 'b', { start, end: text.length }).length, 2);
    assert.equal(hints(session, 'b', { start: 0, end: 10 }).length, 0);
  });
});
