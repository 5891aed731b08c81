import type { Net } from '../board/model';
import type { AssumedEnd } from '../budget/results';
import { defineRule, type Fault } from './rule';
import { hasUnreadablePart } from './unreadableParts';

export interface MissingTermination extends Fault {
  readonly net: Net;
  readonly ends: readonly AssumedEnd[];
}

export const missingTermination = defineRule<MissingTermination>({
  name: 'missing-termination',
  severity: 'warning',
  documentation: {
    finds: 'A net that couples and states no `source` or no `load`; it says what was assumed instead. A driver without `source` counts 10 Ω, without `load` 1 MΩ and 5 pF; a receiver without `source` is computed with 0 Ω and with 1 MΩ, and the larger counts; a net that is neither ends in its own characteristic resistance.',
    matters: 'The same coupling makes a millivolt across 50 Ω and a volt across an open input. What a receiver sees depends on both of its ends more than on anything in the cross-section.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net CLOCK { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace CLOCK 0.15 mm; gap 0.5 mm; trace SENSE 0.15 mm }
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net CLOCK { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace CLOCK 0.15 mm; gap 0.5 mm; trace SENSE 0.15 mm }
`,
    models: ['lines/lineResponse'],
  },

  *find({ project, assumedEnds }) {
    const nets = new Map<string, AssumedEnd[]>();
    for (const end of assumedEnds) nets.set(end.net.name, [...(nets.get(end.net.name) ?? []), end]);
    for (const ends of nets.values()) {
      const [{ net }] = ends as [AssumedEnd, ...AssumedEnd[]];
      // An end that is written but could not be read is not missing, and has its own finding.
      if (hasUnreadablePart(project, net)) continue;
      yield { at: net.place, subject: { kind: 'net', name: net.name }, net, ends };
    }
  },

  message: ({ net, ends }) => {
    const [first] = ends;
    const alike = 1 < ends.length && ends.every(({ assumed }) => assumed === first!.assumed);
    if (alike) return `${net.name} states no \`source\` and no \`load\` (assumed for both: ${first!.assumed})`;
    return `${net.name} states no ${ends.map(({ missing, assumed }) => `\`${missing}\` (assumed: ${assumed})`).join(' and no ')}`;
  },
});
