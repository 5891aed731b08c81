import type { Declared, Net, NameSet, Project } from '../board/model';
import { defineRule, type Fault } from './rule';

export interface UnusedDeclaration extends Fault {
  readonly kind: 'net' | 'family';
  /** All names that one declaration declares and nothing uses: `D[0..7]` declares eight. */
  readonly unused: readonly Declared[];
  /** It declares nothing that is used, so it can go. */
  readonly whole: boolean;
}

export const unusedDeclaration = defineRule<UnusedDeclaration>({
  name: 'unused-declaration',
  severity: 'hint',
  documentation: {
    finds: 'A net or a family of the file that was asked for which nothing refers to: no run, loop, return, link, shield or pair, and no `is`.',
    matters: 'A net that lies in no run is counted nowhere. Either it is left over, or its run was forgotten, and a budget looks better than the board.',
    bad: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
net SPARE { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
    good: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm, 10 pF; tolerates 2 V peak }
run beside on TOP for 20 mm { trace A 0.15 mm; gap 0.5 mm; trace B 0.15 mm }
`,
    models: [],
  },

  *find({ project }) {
    if (mayBeUsedUnread(project)) return;
    yield* unusedOf(project, 'net', 'signal', [...project.nets.values()].filter((net) => !isForItself(net)));
    yield* unusedOf(project, 'family', 'family', [...project.families.values()].filter(({ builtIn }) => !builtIn));
  },

  message: ({ kind, unused }) => {
    const [first, ...others] = unused.map(({ name }) => name);
    if (kind === 'family') return `no net is ${first}: the family is declared and never used`;
    return others.length === 0 ? `${first} lies in no run and nothing else refers to it` : `${first} and ${others.length} more lie in no run and nothing else refers to them`;
  },
});

/** A file that has not been read may use anything; a word that is missing or misspelt may be any name. */
function mayBeUsedUnread({ includes, files, errors }: Project): boolean {
  const read = new Set(files);
  return includes.some(({ path }) => path === null || !read.has(path)) || errors.some(({ rule }) => couldBeName.has(rule));
}

/** It says what it listens through: there is a budget even where no copper comes near. */
function isForItself({ noise, contact, toleratesPeak, toleratesRms }: Net): boolean {
  return (toleratesPeak !== null || toleratesRms !== null) && (noise !== null || contact !== null);
}

const couldBeName: ReadonlySet<string> = new Set(['syntax', 'missing-value', 'unknown-name', 'include']);

function* unusedOf(project: Project, kind: 'net' | 'family', set: NameSet, declared: readonly Declared[]): Iterable<UnusedDeclaration> {
  const records = project.names.get(set);
  const statements = new Map<string, { all: number; unused: Declared[] }>();
  for (const one of declared) {
    if (one.place.path !== project.root) continue;
    const key = `${one.place.span.start}`;
    const statement = statements.get(key) ?? { all: 0, unused: [] };
    statements.set(key, statement);
    statement.all += 1;
    const record = records?.get(one.name);
    if (record !== undefined && record.uses.length === 0 && !record.inUnreadable) statement.unused.push(one);
  }
  for (const { all, unused } of statements.values()) {
    const [first] = unused;
    if (first !== undefined) yield { at: first.place, subject: { kind, name: first.name }, kind, unused, whole: unused.length === all };
  }
}
