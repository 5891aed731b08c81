/**
 * The JSON of `check --format json`, version 1, as the language reference fixes it: every key always
 * present, null for what has no value, lists never null. Later versions add keys or raise `version`.
 */
import { z } from 'zod';

const position = z.strictObject({ line: z.int().min(0), character: z.int().min(0) });
const range = z.strictObject({ start: position, end: position }).describe('Counted from 0, UTF-16, end exclusive, never empty.');
const named = { name: z.string(), path: z.string(), range };
const bounds = z.tuple([z.number(), z.number()]).nullable().describe('Over the stated tolerances; null where they are not carried through.');

const finding = z.strictObject({
  rule: z.string(),
  severity: z.enum(['error', 'warning', 'information', 'hint']),
  message: z.string(),
  path: z.string(),
  range,
  subject: z.strictObject({ kind: z.string(), name: z.string() }).nullable(),
  key: z.string().describe('Baseline key: rule and names, no line.'),
  value: z.number().nullable(),
  limit: z.number().nullable(),
  unit: z.string().nullable(),
  waived: z.string().nullable().describe('The reason of the waiver.'),
  related: z.array(z.strictObject({ path: z.string(), range, message: z.string() })),
});

const coupling = z.strictObject({
  aggressor: z.string(),
  victim: z.string(),
  kind: z.enum(['net', 'pair', 'common']).describe('What is read of the victim: a net; of a pair, the difference or the mean.'),
  edge: z.enum(['rise', 'fall', 'sine']),
  frequency: z.number().nullable().describe('Hz: of a sine, the worst in its range; its voltages are magnitudes.'),
  model: z.enum(['lumped', 'line']),
  nearEnd: z.number().describe('Signed peak, V.'),
  farEnd: z.number().describe('Signed peak, V.'),
  atReceiver: z.number().describe('Signed peak, V.'),
  peakTime: z.number().nullable().describe('Null of a sine.'),
  widthHalf: z.number().nullable().describe('Null of a sine.'),
  capacitivePart: z.number(),
  inductivePart: z.number(),
  errorBar: z.number(),
  bounds,
});

const matrix = z.array(z.array(z.number())).nullable();

const run = z.strictObject({
  ...named,
  length: z.number(),
  conductors: z.array(z.string()).describe('Traces, left to right, rows top to bottom: the order of the matrices.'),
  capacitance: matrix.describe('F/m, Maxwell form; guards and returns reduced out. Null where the section could not be solved.'),
  capacitanceInAir: matrix.describe('F/m'),
  inductance: matrix.describe('H/m, external.'),
  impedance: z.array(z.number()).describe('Of each alone, the others at zero potential: ohm.'),
  delay: z.array(z.number()).describe('Of each alone, the others at zero potential: s/m.'),
  errorBar: z.number().nullable().describe('Relative, of the largest entry.'),
  couplings: z.array(coupling),
});

const loop = z.strictObject({
  ...named,
  area: z.number().nullable(),
  perimeter: z.number().nullable(),
  inductance: z.number().nullable(),
  emission: z.array(z.strictObject({ frequency: z.number(), distance: z.number(), field: z.number(), limit: z.number(), marginDb: z.number().nullable() })),
  mutual: z.array(z.strictObject({ with: z.string(), inductance: z.number(), induced: z.number().nullable() })),
});

const sharedReturn = z.strictObject({ ...named, resistance: z.number().nullable(), inductance: z.number().nullable(), drops: z.array(z.strictObject({ net: z.string(), peak: z.number() })) });
const link = z.strictObject({ ...named, induced: z.array(z.strictObject({ aggressor: z.string(), victim: z.string(), peak: z.number() })) });
const shield = z.strictObject({ ...named, frequency: z.number().nullable(), effectivenessDb: z.number().nullable() });

const contribution = z.strictObject({
  channel: z.enum(['coupled', 'link', 'loop', 'shared return', 'radiated', 'thermal', 'amplifier', 'flicker', 'contact']),
  from: z.string().nullable(),
  where: z.string().nullable(),
  group: z.string().nullable(),
  value: z.number(),
  unfiltered: z.number().nullable(),
  bounds,
  method: z.string(),
  assumptions: z.array(z.string()),
});

const budget = z.strictObject({
  net: z.string(),
  kind: z.enum(['net', 'pair', 'common']),
  path: z.string(),
  range,
  tolerates: z.number(),
  measure: z.enum(['peak', 'rms']),
  combine: z.enum(['worst', 'rss']),
  total: z.number().nullable(),
  bounds,
  errorBar: z.number().nullable(),
  marginDb: z.number().nullable(),
  verdict: z.enum(['pass', 'low', 'over', 'unknown']),
  complete: z.boolean(),
  unaccounted: z.array(z.string()),
  contributions: z.array(contribution),
});

const file = z.strictObject({
  path: z.string(),
  uses: z.array(z.string()),
  complete: z.boolean(),
  findings: z.array(finding),
  runs: z.array(run),
  loops: z.array(loop),
  returns: z.array(sharedReturn),
  links: z.array(link),
  shields: z.array(shield),
  budgets: z.array(budget),
});

export const checkSchema = z.strictObject({
  version: z.literal(1),
  tool: z.string(),
  units: z.literal('SI'),
  summary: z.strictObject({
    errors: z.int().min(0),
    warnings: z.int().min(0),
    information: z.int().min(0),
    hints: z.int().min(0),
    waived: z.int().min(0),
    worst: z.strictObject({ file: z.string(), budget: z.string(), marginDb: z.number() }).nullable(),
  }),
  files: z.array(file),
});

export type CheckReport = z.infer<typeof checkSchema>;
export type FileReport = CheckReport['files'][number];
export type Summary = CheckReport['summary'];
