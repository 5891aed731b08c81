import { textRule } from './textRule';

export const syntax = textRule('syntax', {
  finds: 'Text that does not fit the language: it says what was found and what fits there.',
  matters: 'What cannot be read is not computed. Everything around it still is.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rises 5 ns }
net B { load 1 kohm; source 100 ohm; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { load 1 kohm; source 100 ohm; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  models: [],
});
