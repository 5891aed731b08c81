import { defineRule, type Fault, type Subject } from './rule';

interface OutsideModel extends Fault {
  readonly words: string;
}

export const outsideModel = defineRule<OutsideModel>({
  name: 'outside-model',
  severity: 'information',
  documentation: {
    finds: 'Geometry, speed or frequency beyond the range in which the model behind a number was checked, with that range.',
    matters: 'Every formula has a range, and a number from outside it looks like any other. Here it says so.',
    bad: `stackup {
  copper TOP    35 um
  core   0.5 mm er 4.4
  plane  GND    18 um
  core   0.5 mm er 4.4
  copper BOTTOM 35 um
}
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run across for 20 mm {
  on TOP { trace A 0.15 mm }
  on BOTTOM { trace B 0.15 mm }
}
`,
    good: `stackup {
  copper TOP    35 um
  core   0.5 mm er 4.4
  plane  GND    18 um
}
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
    models: ['section/solveSection', 'lines/lineResponse'],
  },

  *find({ limits }) {
    for (const { subject, place, message } of limits) {
      yield { at: place, subject: { kind: subject.kind as Subject['kind'], name: subject.name }, names: [message.replace(/[\d.,]+/g, '')], words: message };
    }
  },

  message: ({ words }) => words,
});
