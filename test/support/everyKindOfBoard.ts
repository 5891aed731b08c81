/**
 * Small boards of every kind of source, receiver and way between them: seeded, as a list of declarations that may stand in any order.
 * Dimensions are few, so that thousands of boards share their cross-sections.
 */
import { seeded, type Random } from './generatedBoard';

export function everyKindOfBoard(seed: number): readonly string[] {
  const random = seeded(seed);
  const names = ['A', 'B', 'P', 'N', 'V', 'W'];
  const group = () => (random.chance(0.3) ? '; switches with G' : '');
  const rate = () => random.pick(['repeats 100 kHz', 'repeats 1 MHz duty 30 %', 'once', '']);
  const ends = () => `source ${random.pick(['0 ohm', '22 ohm', '100 ohm, 10 pF'])}; load ${random.pick(['50 ohm', '10 kohm, 30 pF', '1 nF', '1 Mohm, 5 pF'])}`;
  const moving = () => random.pick([
    `swing ${random.pick(['3.3 V', '24 V'])}; rise ${random.pick(['1 ns', '30 ns', '150 ns'])}${random.chance(0.3) ? '; fall 10 ns' : ''}; ${rate()}`,
    `sine 325 V peak at 50 Hz`,
    `sine 1 V rms at 1 MHz to 30 MHz`,
    `current 1 A rise 40 ns; ${rate()}`,
    `swing 5 V; rise 5 ns; current 0.2 A; ${rate()}`,
    `current 2 A peak at 100 kHz`,
  ]);
  const listening = () => `tolerates ${random.pick(['1 mV', '50 mV'])} ${random.pick(['peak', 'rms; band 1 kHz to 20 MHz', 'peak; band 10 kHz to 4 MHz', 'peak; tolerates 1 mV rms; band 10 Hz to 1 MHz'])}${random.chance(0.2) ? '; samples 100 ns after G' : ''}`;
  const nets = [
    `net A { ${moving()}; ${ends()}${group()} }`,
    `net B { ${moving()}; ${ends()}${group()}${random.chance(0.2) ? '; both ways' : ''} }`,
    `net V { ${random.chance(0.7) ? ends() : 'load 1 Mohm, 8 pF'}; ${listening()} }`,
    `net W { ${ends()}; ${random.chance(0.3) ? `${moving()}; ` : ''}${listening()} }`,
    'net G0 { swing 1 V; rise 1 us; once; switches with G }',
    `net P { ${ends()} }`,
    `net N { ${ends()} }`,
    `pair D { plus P; minus N; ${random.chance(0.4) ? `${moving()}; ` : ''}${random.chance(0.5) ? 'across 100 ohm, 2 pF; ' : ''}${listening()}${random.chance(0.5) ? '; rejects 60 dB' : ''}${random.chance(0.5) ? '; common tolerates 0.5 V peak' : ''} }`,
  ];
  const runs = Array.from({ length: 1 + Math.floor(random.next() * 2) }, (_, at) => {
    const order = names.map((name) => ({ name, by: random.next() })).sort((a, b) => a.by - b.by).slice(0, random.pick([2, 2, 3])).map(({ name }) => name);
    return `run run${at} on TOP for ${random.pick(['8 mm', '40 mm'])} { ${order.map((name) => `trace ${name} 0.2 mm${random.chance(0.2) ? ' reversed' : ''}`).join(`; gap ${random.pick(['0.2 mm', '0.5 mm'])}; `)} }`;
  });
  const at = () => `at (${random.pick(['0', '12', '40'])} mm, ${random.pick(['0', '15', '30'])} mm, ${random.pick(['1', '5'])} mm)`;
  const loops = random.chance(0.5) ? [
    `loop out { carries ${random.pick(['A', 'B', 'P', 'A 1 A rise 20 ns'])}; ${random.pick(['rectangle 10 mm by 6 mm', 'circle 9 mm'])} ${at()}; ${random.pick(['wire 0.5 mm', 'strip 1 mm', ''])} }`,
    `loop in { senses ${random.pick(['V', 'W', 'D', 'N'])}; rectangle 8 mm by ${random.pick(['2 mm', '5 mm'])} ${at()}; ${random.pick(['wire 0.3 mm', ''])}${random.chance(0.3) ? '; turned 60 deg about y' : ''} }`,
  ] : [];
  const returns = random.chance(0.4) ? [`return ground { ${random.pick(['strip 30 mm by 1.5 mm on TOP', 'via 3 drill 0.3 mm', 'measured 2 mohm, 1.2 nH', 'strip 20 mm by 2 mm on TOP; over GND'])}; carries ${random.pick(['A', 'B', 'P'])}; refers ${random.pick(['V', 'W', 'D'])} }`] : [];
  const links = random.chance(0.4) ? [`link body { between ${random.pick(['A', 'B', 'P'])} and ${random.pick(['V', 'W', 'N'])}; ${random.pick(['capacitance 0.5 pF', 'mutual 2 nH', 'capacitance 1 pF; mutual 1 nH'])} }`] : [];
  const board = random.chance(0.5) ? [`board made-up { combine ${random.pick(['worst', 'rss'])}; headroom 3 dB; temperature 55 degC }`] : [];
  return [...board, 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }', ...nets, ...runs, ...loops, ...returns, ...links];
}

export function shuffled<Each>(all: readonly Each[], random: Random): readonly Each[] {
  return all.map((each) => ({ each, by: random.next() })).sort((a, b) => a.by - b.by).map(({ each }) => each);
}
