import type { Given, Run, RunConductor } from '../board/model';
import { inText } from '../units/inText';
import { metres, type Length } from '../units/quantity';
import { placesInFiles } from './budgetFault';
import { defineRule, type Fault } from './rule';

export interface GapBelowClearance extends Fault {
  readonly run: Run;
  readonly row: number;
  readonly gap: number;
  readonly width: Given<Length>;
  readonly clearance: Length;
  readonly left: string;
  readonly right: string;
}

/** What the language assumes where a board states none. */
const assumedClearance = metres(0.1e-3);

export const gapBelowClearance = defineRule<GapBelowClearance>({
  name: 'gap-below-clearance',
  severity: 'error',
  documentation: {
    finds: 'A gap smaller than the board’s `clearance`, the smallest that its fabricator makes (0.1 mm where it is not stated).',
    matters: 'A gap that cannot be etched comes back as a query from the fabricator at best, and as a short at worst. What the noise would be across it does not matter.',
    bad: `board narrow { clearance 0.15 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { length 30 mm }
net B { length 30 mm }
run beside on TOP for 20 mm { trace A 0.2 mm; gap 0.10 mm; trace B 0.2 mm }
`,
    good: `board narrow { clearance 0.15 mm }
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { length 30 mm }
net B { length 30 mm }
run beside on TOP for 20 mm { trace A 0.2 mm; gap 0.15 mm; trace B 0.2 mm }
`,
    models: [],
  },

  *find({ project }) {
    const clearance = project.board.clearance?.value ?? assumedClearance;
    for (const run of project.runs) {
      for (const [row, { conductors, gaps }] of run.rows.entries()) {
        for (const [gap, width] of gaps.entries()) {
          // All gaps of a `spaced` range are one statement, and one finding.
          if (!isBelow(width.value, clearance) || gaps.findIndex(({ place }) => place === width.place) < gap) continue;
          const [left, right] = [nameOf(conductors[gap]!), nameOf(conductors[gap + 1]!)];
          yield {
            at: width.place,
            subject: { kind: 'run', name: run.name },
            names: [left, right],
            related: placesInFiles(project, [{ place: project.board.clearance?.place ?? null, message: `clearance of the board: ${inText(clearance, 'length')}` }]),
            value: width.value,
            limit: clearance,
            unit: 'm',
            run, row, gap, width, clearance, left, right,
          };
        }
      }
    }
  },

  message: ({ width, clearance, left, right, run }) =>
    `${inText(width.value, 'length')} between ${left} and ${right} in run ${run.name}: the smallest gap that the fabricator makes is ${inText(clearance, 'length')}`,
});

/** `0.1 mm` and `100 um` are equal, whatever their last bits. */
function isBelow(value: number, limit: number): boolean {
  return value < limit * (1 - 1e-9);
}

function nameOf(conductor: RunConductor): string {
  return conductor.kind === 'trace' ? conductor.net.name : conductor.name;
}
