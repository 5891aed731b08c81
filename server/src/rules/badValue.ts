import { textRule } from './textRule';

export const badValue = textRule('bad-value', {
  finds: 'A value that cannot be: a length, time or resistance below zero, a width or gap of zero, a relative permittivity below 1, a band upside down, an undercut of more than half the width.',
  matters: 'It is nearly always a slip of the keyboard, and a number computed from it would look like any other.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 0.42; plane GND 18 um }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
`,
  models: [],
});
