import type { LooseGuard } from '../budget/results';
import type { Run } from '../board/model';
import { inText } from '../units/inText';
import { placesInFiles } from './budgetFault';
import { defineRule, type Fault } from './rule';

export interface GuardUnstitched extends Fault {
  readonly run: Run;
  readonly loose: LooseGuard;
}

export const guardUnstitched = defineRule<GuardUnstitched>({
  name: 'guard-unstitched',
  severity: 'warning',
  documentation: {
    finds: 'A guard whose ties to the reference are further apart than a twentieth of the wavelength at the knee frequency (0.35 divided by the rise time) of the fastest edge in its run.',
    matters: 'Between ties that are too far apart a guard is one more line that rings: it carries the noise across instead of taking it away, and can leave the receiver worse off than bare board. Peaks of edges are computed with the guard as one more line, shorted through its vias (drill of 0.3 mm) at each tie, so a guard that makes things worse is shown to; sines, repeated edges, lines with something across their ends and guards of more ties than are solved one by one are computed as if the ties held.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net CLOCK { swing 3.3 V; rise 1 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { source 50 ohm; load 1 kohm, 10 pF; tolerates 0.2 V peak }
run alley on TOP for 40 mm {
  trace CLOCK 0.15 mm
  gap   0.20 mm
  guard GND   0.25 mm
  gap   0.20 mm
  trace SENSE 0.15 mm
}
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net CLOCK { swing 3.3 V; rise 1 ns; source 33 ohm; load 1 Mohm, 5 pF }
net SENSE { source 50 ohm; load 1 kohm, 10 pF; tolerates 0.2 V peak }
run alley on TOP for 40 mm {
  trace CLOCK 0.15 mm
  gap   0.20 mm
  guard GND   0.25 mm stitched 4 mm
  gap   0.20 mm
  trace SENSE 0.15 mm
}
`,
    models: ['section/solveSection'],
  },

  *find({ project, runs }) {
    for (const { run, looseGuards } of runs) {
      for (const loose of looseGuards) {
        yield {
          at: loose.guard.place,
          subject: { kind: 'run', name: run.name },
          names: [loose.guard.name],
          related: placesInFiles(project, [{ place: loose.guard.stitched?.place ?? run.length.place, message: `its ties are ${inText(loose.spacing, 'length')} apart` }]),
          value: loose.spacing,
          limit: loose.largest,
          unit: 'm',
          run,
          loose,
        };
      }
    }
  },

  message: ({ run, loose: { guard, spacing, largest, past } }) => past !== null
    ? `${inText(past.asTied, 'voltage')} ${past.stitched < past.asTied ? `instead of ${inText(past.stitched, 'voltage')} ` : ''}on ${past.receiver} past guard ${guard.name} in run ${run.name}, of which the ties are ${inText(spacing, 'length')} apart: at most ${inText(largest, 'length')} hold at the fastest edge there`
    : `${inText(spacing, 'length')} between the ties of guard ${guard.name}: at most ${inText(largest, 'length')} hold at the fastest edge in run ${run.name}; its noise is computed as if they held and is not to be trusted until they do`,
});
