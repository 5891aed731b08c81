import { textRule } from './textRule';

export const duplicateName = textRule('duplicate-name', {
  finds: 'A name that is declared twice in a project, or a property that is stated twice.',
  matters: 'Two values for one thing: whichever counted, somebody would read the other.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF; rise 2 ns }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; fall 2 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
  models: [],
});
