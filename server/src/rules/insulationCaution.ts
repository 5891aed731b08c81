import type { Place, Run, RunConductor, StackupRow } from '../board/model';
import { inText } from '../units/inText';
import { placesInFiles } from './budgetFault';
import { defineRule, type Fault } from './rule';
import { hazardInText, hazardousVoltage, type HazardousVoltage } from './touchLimits';

interface InsulationCaution extends Fault {
  readonly conductor: string;
  readonly run: string;
  readonly voltage: HazardousVoltage;
  readonly neighbours: readonly Neighbour[];
}

interface Neighbour {
  readonly name: string;
  readonly distance: number;
  readonly side: 'beside' | 'above' | 'below';
  /** The gap or the insulating row that decides. */
  readonly place: Place;
}

export const insulationCaution = defineRule<InsulationCaution>({
  name: 'insulation-caution',
  severity: 'warning',
  documentation: {
    finds: 'A gap beside, or insulation above or below, a conductor whose `working`, `swing` or `sine` voltage exceeds 30 V rms, 42.4 V peak or 60 V dc (touch limits for dry, normal conditions, IEC 61010-1, from memory; others are lower or different).',
    matters: 'A gap that is wide enough for noise says nothing of whether it is wide enough for people. Quietrun never proposes to bring copper nearer to such a net, and it never says that a distance is safe.',
    bad: `stackup { copper TOP 35 um; core 1.5 mm er 4.4; copper BOTTOM 35 um }
net MAINS_L { working 230 V rms }
net COIL { swing 12 V; rise 1 us; source 10 ohm; load 1 kohm, 100 pF }
run relay on TOP for 15 mm {
  trace  MAINS_L 2.00 mm
  gap    6.00 mm
  trace  COIL    0.50 mm
  gap    0.50 mm
  return GND     2.00 mm
}
`,
    good: `stackup { copper TOP 35 um; core 1.5 mm er 4.4; copper BOTTOM 35 um }
net SUPPLY { working 24 V dc }
net COIL { swing 12 V; rise 1 us; source 10 ohm; load 1 kohm, 100 pF }
run relay on TOP for 15 mm {
  trace  SUPPLY 2.00 mm
  gap    0.50 mm
  trace  COIL   0.50 mm
  gap    0.50 mm
  return GND    2.00 mm
}
`,
    models: [],
  },

  *find({ project }) {
    for (const run of project.runs) {
      for (const [row, { conductors }] of run.rows.entries()) {
        for (const [index, conductor] of conductors.entries()) {
          const net = conductor.kind === 'trace' ? conductor.net : project.nets.get(conductor.name);
          const voltage = net === undefined ? null : hazardousVoltage(net, project);
          if (voltage === null) continue;
          const neighbours = [...besideIt(run, row, index), ...aboveAndBelow(run, row)];
          if (neighbours.length === 0) continue;
          yield {
            at: conductor.place,
            subject: { kind: 'run', name: run.name },
            names: [nameOf(conductor)],
            related: placesInFiles(project, neighbours.map((neighbour) => ({ place: neighbour.place, message: neighbourInText(neighbour) }))),
            value: voltage.value,
            limit: voltage.limit,
            unit: 'V',
            conductor: nameOf(conductor),
            run: run.name,
            voltage,
            neighbours,
          };
        }
      }
    }
  },

  message: ({ conductor, run, voltage, neighbours }) =>
    `${hazardInText(voltage)} on ${conductor} in run ${run}, ${neighbours.map(neighbourInText).join(', ')}: over ${voltage.limit} V ${voltage.measure}. ${insulationWords}`,
});

/** As the language words it, wherever distances are spoken of. */
export const insulationWords = 'Quietrun does not judge insulation. Clearance, creepage, distance through insulation and coating are for the applicable standard and a qualified person; that there is no finding does not mean that insulation is adequate.';

function besideIt(run: Run, row: number, index: number): Neighbour[] {
  const { conductors, gaps } = run.rows[row]!;
  const sides = [{ gap: gaps[index - 1], conductor: conductors[index - 1] }, { gap: gaps[index], conductor: conductors[index + 1] }];
  return sides.flatMap(({ gap, conductor }) => (gap === undefined || conductor === undefined ? [] : [{ name: nameOf(conductor), distance: gap.value, side: 'beside' as const, place: gap.place }]));
}

/** The next layers of copper on both sides that are not cut away. */
function aboveAndBelow(run: Run, row: number): Neighbour[] {
  const { rows } = run.stackup;
  const own = rows.indexOf(run.rows[row]!.layer);
  const above = nextCopper(run, rows.slice(0, own).reverse());
  const below = nextCopper(run, rows.slice(own + 1));
  return [...(above === null ? [] : [{ ...above, side: 'above' as const }]), ...(below === null ? [] : [{ ...below, side: 'below' as const }])];
}

function nextCopper(run: Run, outward: readonly StackupRow[]): Omit<Neighbour, 'side'> | null {
  let distance = 0;
  let place: Place | null = null;
  for (const row of outward) {
    const isCopper = row.kind === 'plane' || row.kind === 'copper';
    if (isCopper && place !== null && !run.without.includes(row.name)) return { name: row.name, distance, place };
    if (!isCopper) place ??= row.thickness.place;
    distance += row.thickness.value;
  }
  return null;
}

function neighbourInText({ name, distance, side }: Neighbour): string {
  return `${inText(distance, 'length')} from ${name} ${side}`.replace(/ beside$/, '');
}

function nameOf(conductor: RunConductor): string {
  return conductor.kind === 'trace' ? conductor.net.name : conductor.name;
}
