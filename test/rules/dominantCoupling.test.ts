/** Where a way other than a run dominates, its finding leads to both sides of it. */
import assert from 'node:assert/strict';
import { it } from 'node:test';
import { evaluated, rootPath } from '../support/evaluated';

const nets = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um }
net HEATER { swing 24 V; rise 40 ns; source 5 ohm; load 100 ohm }
net SENSE  { source 1 kohm; load 1 Mohm; tolerates 10 uV peak }
`;

function checkSides(title: string, ways: string, expected: readonly string[]): void {
  it(title, () => {
    const text = nets + ways;
    const { findings } = evaluated(new Map([[rootPath, text]]));
    const found = findings.find(({ rule }) => rule === 'dominant-coupling')!;
    const written = ({ span: { start, end } }: { readonly span: { readonly start: number; readonly end: number } }) => text.slice(start, end);
    assert.deepEqual([`${found.subject!.kind} ${written(found.at)}`, ...found.related.map(({ place, message }) => `${written(place)}: ${message}`)], expected);
  });
}

const tolerated = '10 uV: SENSE tolerates 10.0 µV';

checkSides('a loop', 'loop out on TOP { carries HEATER; rectangle 20 mm by 9 mm; strip 1 mm }\nloop in on TOP { senses SENSE; rectangle 10 mm by 3 mm at (24 mm, 0 mm); wire 0.3 mm }\n', ['loop out', tolerated, 'HEATER: HEATER, the source', 'SENSE: SENSE, the receiver']);
checkSides('a return', 'return ground { strip 30 mm by 1.5 mm on TOP; carries HEATER; refers SENSE }\n', ['return ground', tolerated, 'HEATER: HEATER, the source', 'SENSE: SENSE, the receiver']);
checkSides('a link', 'link body { between HEATER and SENSE; capacitance 0.2 pF }\n', ['link body', tolerated]);
checkSides('a loop in a field', 'loop in on TOP { senses SENSE; rectangle 10 mm by 30 mm; wire 0.3 mm }\nambient radio { field 10 V/m from 80 MHz to 100 MHz }\n', ['loop in', tolerated]);
checkSides('the return of a run', 'stackup flex { core 0.1 mm er 3.5; copper FLEX 18 um }\nrun tail on FLEX for 200 mm { trace HEATER 1 mm; gap 3 mm; return GND 0.2 mm; gap 3 mm; trace SENSE 0.2 mm }\n', ['run tail', tolerated]);
