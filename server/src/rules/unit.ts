import { textRule } from './textRule';

export const unit = textRule('unit', {
  finds: 'A number without a unit, with a unit of another kind, or with one in the wrong case: it says which fit.',
  matters: '40 of what? A board that was checked with millimetres for mils was not checked. The tool never guesses a unit.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 er 4.2; plane GND 18 um }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
`,
  models: [],
});
