import { textRule } from './textRule';

export const missingValue = textRule('missing-value', {
  finds: 'A statement that lacks a value it needs, or a declaration that lacks a statement it needs; marked at the word before it.',
  matters: 'Without it the numbers that depend on it are not computed, and their budgets are incomplete.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  models: [],
});
