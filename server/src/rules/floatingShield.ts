import type { Shield } from '../board/model';
import { defineRule, type Fault } from './rule';

interface FloatingShield extends Fault {
  readonly shield: Shield;
  readonly receivers: readonly string[];
}

export const floatingShield = defineRule<FloatingShield>({
  name: 'floating-shield',
  severity: 'warning',
  documentation: {
    finds: 'A shield that is not grounded, over a receiver on a board that has a source of electric field: something that swings, or a radio field.',
    matters: 'Metal that floats takes on the potential of the field around it and hands it on to what lies beneath, often nearer than the source was. Tied to the reference, the same piece of metal carries that charge away.',
    bad: `net RX_IN { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
loop rx-input { senses RX_IN; rectangle 4 mm by 1 mm; wire 0.3 mm }
ambient radio { field 3 V/m from 80 MHz to 1 GHz }
shield lid { covers RX_IN; sheet tin 0.2 mm; slot 6 mm; floating }
`,
    good: `net RX_IN { source 200 ohm; load 1 Mohm, 8 pF; tolerates 2 mV peak }
loop rx-input { senses RX_IN; rectangle 4 mm by 1 mm; wire 0.3 mm }
ambient radio { field 3 V/m from 80 MHz to 1 GHz }
shield lid { covers RX_IN; sheet tin 0.2 mm; slot 6 mm; grounded }
`,
    models: ['shields/sheet'],
  },

  *find({ project, budgets }) {
    const electric = 0 < project.ambients.length || [...project.nets.values(), ...project.pairs.values()].some(({ swing, sine }) => swing !== null || sine !== null);
    if (!electric) return;
    for (const shield of project.shields) {
      if (shield.grounded !== false) continue;
      const covered = new Set(shield.covers.flatMap(({ subject }) => ('kind' in subject ? [subject] : subject.senses.map(({ signal }) => signal))));
      const receivers = [...new Set(budgets.filter(({ subject }) => covered.has(subject)).map(({ subject }) => subject.name))];
      if (0 < receivers.length) yield { at: shield.place, subject: { kind: 'shield', name: shield.name }, shield, receivers };
    }
  },

  message: ({ shield, receivers: [first, ...others] }) => `shield ${shield.name} floats over ${first}${others.length === 0 ? '' : ` and ${others.length} more`}: it hands the electric field on instead of keeping it out. Tie it to the reference and state \`grounded\``,
});
