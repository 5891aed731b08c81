import { defineRule, type Fault } from './rule';

interface NoReturnPath extends Fault {
  readonly run: string;
}

export const noReturnPath = defineRule<NoReturnPath>({
  name: 'no-return-path',
  severity: 'error',
  documentation: {
    finds: 'A run with neither a plane nor a `return`: nothing in its cross-section carries its current back.',
    matters: 'Current always comes back; where its way back is not drawn, it takes one that nobody chose. Without that way neither an impedance nor any coupling of the run has a value.',
    bad: `stackup { copper TOP 35 um; core 1.5 mm er 4.4; copper BOTTOM 35 um }
net A { swing 5 V; rise 10 ns; source 50 ohm; load 1 kohm }
net B { source 1 kohm; load 1 kohm }
run beside on TOP for 20 mm { trace A 0.3 mm; gap 0.5 mm; trace B 0.3 mm }
`,
    good: `stackup { copper TOP 35 um; core 1.5 mm er 4.4; copper BOTTOM 35 um }
net A { swing 5 V; rise 10 ns; source 50 ohm; load 1 kohm }
net B { source 1 kohm; load 1 kohm }
run beside on TOP for 20 mm { trace A 0.3 mm; gap 0.5 mm; trace B 0.3 mm; gap 0.3 mm; return GND 2 mm }
`,
    models: ['section/solveSection'],
  },

  *find({ runs }) {
    for (const { run, refusal } of runs) {
      if (refusal?.reason === 'no-reference') yield { at: run.place, subject: { kind: 'run', name: run.name }, run: run.name };
    }
  },

  message: ({ run }) => `no way back for the current in run ${run}, so it has no impedance and no noise: state a \`return NAME WIDTH\` in its row, or a plane in its stackup`,
});
