import type { Evaluation } from '../budget/results';
import { closest } from '../syntax/words';
import { isRuleName, ruleNames } from './ruleNames';
import { textRule, type TextFault } from './textRule';

export const unknownName = textRule('unknown-name', {
  finds: 'A name that nothing declares: a net, a layer, a family, the subject of a waiver, or a rule that does not exist.',
  matters: 'A misspelt net is a net that is counted nowhere; its run would look quiet.',
  bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net SENSE { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace SENSE_A 0.15 mm; gap 0.5 mm; trace SENSE 0.15 mm }
`,
  good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net SENSE { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
net SENSE_A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
run beside on TOP for 20 mm { trace SENSE_A 0.15 mm; gap 0.5 mm; trace SENSE 0.15 mm }
`,
  models: [],
}, unknownRules);

function* unknownRules({ project }: Evaluation): Iterable<TextFault> {
  for (const { rule, rulePlace } of project.waivers) {
    if (isRuleName(rule)) continue;
    const meant = closest(rule, ruleNames);
    const words = `no rule ${rule}${meant === null ? '; `quietrun explain` lists them' : `; ${meant}?`}`;
    const corrections = meant === null ? [] : [{ title: `Change to ${meant}`, place: rulePlace, newText: meant }];
    yield { at: rulePlace, subject: null, names: [words], corrections, words };
  }
}
