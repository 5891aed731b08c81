/**
 * Boards that nobody wrote: seeded, so that a failure comes back. Legal text in many of the shapes that
 * people use: rows on lines or on one line, millimetres, mils or micrometres, comments, tolerances, guards,
 * several runs of one receiver, two layers, a working voltage.
 */
export interface Random {
  /** From 0 to below 1. */
  next(): number;
  pick<T>(from: readonly T[]): T;
  between(low: number, high: number): number;
  chance(probability: number): boolean;
}

/** Mulberry32: short, and even enough for a generator of test boards. */
export function seeded(seed: number): Random {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  return {
    next,
    pick: (from) => from[Math.floor(next() * from.length)]!,
    between: (low, high) => low * (high / low) ** next(),
    chance: (probability) => next() < probability,
  };
}

export function generatedBoard(seed: number): string {
  const random = seeded(seed);
  const sources = Array.from({ length: 2 + Math.floor(random.next() * 2) }, (_, i) => `S${i}`);
  const receivers = Array.from({ length: 1 + Math.floor(random.next() * 2) }, (_, i) => (random.chance(0.2) ? `"R ${i}"` : `R${i}`));
  const runs = Array.from({ length: 1 + Math.floor(random.next() * 3) }, (_, i) => run(random, `run${i}`, { sources, receivers }));
  const working = (index: number) => (index === 0 && random.chance(0.4) ? '; working 48 V dc' : '');
  const parts = [
    ...(random.chance(0.6) ? [`board made-up { headroom ${random.pick(['3', '6', '0'])} dB; clearance ${random.pick(['0.12 mm', '5 mil'])} }`] : []),
    `stackup {\n  ${random.chance(0.25) ? 'mask 25 um er 3.5\n  ' : ''}copper TOP 35 um\n  prepreg ${random.between(0.1, 0.4).toFixed(2)} mm er 4.2\n  copper INNER 18 um\n  core 0.3 mm er 4.2\n  plane GND1 18 um\n}`,
    ...sources.map((name, index) => `net ${name} { swing ${random.pick(['3.3 V', '12 V', '5 V'])}; rise ${random.pick(['2 ns', '20 ns', '300 ns'])}; source ${random.pick(['10 ohm', '33 ohm'])}; load ${random.pick(['10 kohm, 100 pF', '1 Mohm, 5 pF', '50 ohm'])}${working(index)} }  # drives`),
    ...receivers.map((name) => `net ${name} {\n  source ${random.pick(['50 ohm', '1 kohm'])}\n  load ${random.pick(['1 Mohm, 10 pF', '10 kohm'])}  # input\n  tolerates ${random.pick(['1 mV', '10 mV', '100 mV'])} peak\n}`),
    ...runs,
  ];
  const text = `# seed ${seed}\n${parts.join('\n\n')}\n`;
  return random.chance(0.2) ? text.replaceAll('\n', '\r\n') : text;
}

function run(random: Random, name: string, { sources, receivers }: { readonly sources: readonly string[]; readonly receivers: readonly string[] }): string {
  const unit = random.pick([['mm', 1e-3, 2], ['mil', 25.4e-6, 0], ['um', 1e-6, 0]] as const);
  const length = (low: number, high: number) => `${(random.between(low, high) / unit[1]).toFixed(unit[2])} ${unit[0]}`;
  const receiver = random.pick(receivers);
  const nets = [...new Set([random.pick(sources), receiver, ...(random.chance(0.5) ? [random.pick(sources)] : []), ...(random.chance(0.3) ? [random.pick(receivers)] : [])])];
  const rows = nets.flatMap((net, index) => [
    ...(index === 0 ? [] : random.chance(0.15)
      ? [`gap ${length(0.2e-3, 0.6e-3)}`, `guard AGND ${length(0.2e-3, 0.4e-3)} stitched 3 mm`, `gap ${length(0.2e-3, 0.6e-3)}`]
      : [`gap   ${length(0.15e-3, 1.5e-3)}${random.chance(0.2) ? ' ± 5 %' : ''}`]),
    `trace ${net} ${length(0.15e-3, 0.4e-3)}${random.chance(0.2) ? ' reversed' : ''}`,
  ]);
  const above = random.chance(0.2) ? sources.find((net) => !nets.includes(net)) : undefined;
  if (above !== undefined) return `run ${name} for ${random.between(5, 60).toFixed(1)} mm {\n  on INNER { ${rows.join('; ')} }\n  on TOP { shift ${random.between(0.2, 2).toFixed(1)} mm; trace ${above} 0.2 mm }\n}`;
  const head = `run ${name} on TOP for ${random.between(5, 60).toFixed(1)} mm`;
  if (random.chance(0.25)) return `${head} { ${rows.join('; ')} }`;
  return `${head} {\n${rows.map((row) => `  ${row}${random.chance(0.2) ? '  # as placed' : ''}`).join('\n')}\n}`;
}
