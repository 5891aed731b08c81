/** What a project means: the reference's own example declarations, resolved. Values by hand from the text. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { check, found, layers, nets, resolved } from './resolved';

const close = (actual: number | undefined, expected: number) => assert.ok(actual !== undefined && Math.abs(actual - expected) <= 1e-9 * Math.abs(expected), `${actual} is not ${expected}`);

describe('values', () => {
  it('are SI, with their tolerance and the place of number and unit', () => {
    const text = 'stackup { copper TOP 1 oz; prepreg 0.20 mm ± 10 % er 4.2 +- 0.2; plane GND 18 um }\n';
    const { stackups: [stackup], errors } = resolved(text);
    assert.deepEqual(errors, []);
    const [copper, prepreg] = stackup.rows;
    close(copper.thickness.value, 35e-6);
    close(prepreg.thickness.value, 0.2e-3);
    close(prepreg.thickness.tolerance, 0.02e-3);
    assert.ok(prepreg.kind === 'prepreg');
    close(prepreg.er.value, 4.2);
    close(prepreg.er.tolerance, 0.2);
    const { start, end } = prepreg.thickness.place.span;
    assert.equal(text.slice(start, end), '0.20 mm');
  });

  it('of a swing are its two levels, whichever comes first', () => {
    const { nets: all } = resolved('net A { swing 24 V }\nnet B { swing 5 V to -5 V }\nnet C { swing -12 V }\n');
    const levels = ['A', 'B', 'C'].map((name) => [all.get(name)!.swing!.low, all.get(name)!.swing!.high, all.get(name)!.swing!.value]);
    assert.deepEqual(levels, [[0, 24, 24], [-5, 5, 10], [-12, 0, 12]]);
  });

  it('of a working voltage are magnitudes', () => {
    assert.equal(resolved('net A { working -48 V dc }\n').nets.get('A')!.working!.voltage.value, 48);
  });

  it('read every property of a net', () => {
    const text = `net X {
  swing 0 V to 24 V; rise 40 ns; fall 50 ns; source 5 ohm; load 470 pF, 10 kohm; repeats 20 kHz duty 30 %
  current 1.8 A rise 60 ns; switches with GATES; working 48 V dc; tolerates 2 mV peak; tolerates 1 mV rms
  band 10 kHz to 4 MHz; noise 5 nV/rtHz, 2 pA/rtHz corner 2 kHz; contact -20 dB at 5 V; samples 2 us after GATES
  length 60 mm; both ways; sine 230 V rms at 50 Hz to 60 Hz
}
`;
    check(text);
    const net = resolved(text).nets.get('X')!;
    close(net.rise?.value, 40e-9);
    close(net.fall?.value, 50e-9);
    close(net.source?.resistance?.value, 5);
    assert.equal(net.source?.capacitance, null);
    close(net.load?.resistance?.value, 10e3);
    close(net.load?.capacitance?.value, 470e-12);
    close(net.repeats?.duty?.value, 0.3);
    assert.ok(net.current?.form === 'ramp');
    close(net.current.rise?.value, 60e-9);
    assert.equal(net.switchesWith, 'GATES');
    close(net.toleratesPeak?.value, 2e-3);
    close(net.toleratesRms?.value, 1e-3);
    close(net.band?.to.value, 4e6);
    close(net.noise?.corner?.value, 2e3);
    close(net.contact?.index.value, -20);
    close(net.samples?.delay.value, 2e-6);
    assert.equal(net.samples?.group, 'GATES');
    assert.equal(net.bothWays, true);
    close(net.sine?.to?.value, 60);
    assert.equal(net.sine?.measure, 'rms');
  });
});

describe('runs', () => {
  it('expand a range into neighbours that share one spacing', () => {
    const project = resolved(`${layers}net D[0..7] { swing 1.8 V; rise 1 ns }\nrun bus on TOP for 22 mm { trace D[7..0] 0.10 mm spaced 0.12 mm }\n`);
    assert.deepEqual(project.errors, []);
    assert.equal(project.nets.size, 8);
    const [row] = project.runs[0].rows;
    assert.deepEqual(row.conductors.map((conductor) => conductor.kind === 'trace' && conductor.net.name), ['D7', 'D6', 'D5', 'D4', 'D3', 'D2', 'D1', 'D0']);
    assert.equal(row.gaps.length, 7);
    assert.equal(new Set(row.gaps).size, 1);
    assert.equal(row.conductors[0].kind === 'trace' && row.conductors[0].net, project.nets.get('D7'));
  });

  it('on several layers keep their rows in the order of the text', () => {
    const text = `${layers}${nets}run alley for 22 mm {
  on BOTTOM { trace A 0.2 mm reversed after 12 mm }
  on TOP { shift -0.1 mm; guard GND 0.25 mm stitched 4 mm; gap 0.4 mm; trace B 0.15 mm; gap 0.3 mm; return RTN 2 mm }
  without GND1
  without PWR
}
`;
    check(text);
    const [run] = resolved(text).runs;
    assert.deepEqual(run.rows.map(({ layer }) => layer.name), ['BOTTOM', 'TOP']);
    assert.deepEqual(run.without, ['GND1', 'PWR']);
    close(run.rows[1].shift?.value, -0.1e-3);
    const [trace] = run.rows[0].conductors;
    assert.ok(trace.kind === 'trace' && trace.reversed);
    close(trace.after?.value, 12e-3);
    assert.deepEqual(run.rows[1].conductors.map(({ kind }) => kind), ['guard', 'trace', 'return']);
  });

  it('take their layer from the head in either order', () => {
    for (const head of ['on TOP for 22 mm', 'for 22 mm on TOP']) {
      const { runs } = resolved(`${layers}${nets}run r ${head} { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\n`);
      assert.equal(runs[0].rows[0].layer.name, 'TOP');
    }
  });

  it('refer to layers, nets and families that are declared below them', () => {
    check(`run r on TOP for 22 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\nnet A is fast\nfamily fast { swing 3 V; rise 1 ns }\n${layers}net B { tolerates 1 V peak }\n`);
  });
});

describe('loops, returns, links, shields, ambients', () => {
  const text = `${layers}${nets}pair P { plus A; minus B; across 100 ohm, 2 pF; tolerates 2 uV rms; band 1 kHz to 1 MHz; common tolerates 0.5 V peak; rejects 80 dB }
loop switch on TOP {
  carries A 1.8 A rise 40 ns
  rectangle 22 mm by 9 mm at (10 mm, 4 mm)
  strip 1 mm; over GND1; area at most 120 mm2; inductance at most 25 nH; turned 90 deg about x
}
loop input { senses P; path (40 mm, 4 mm) (54 mm, 4 mm, 1 mm), (54 mm, 5.5 mm); wire 0.3 mm }
loop probe on TOP { senses B; trace 20 mm above GND1 }
return ground { strip 30 mm by 1.5 mm on TOP; over GND1; via 3 drill 0.3 mm; measured 2 mohm, 1.2 nH; carries A; refers B }
link relay { between A and B; capacitance 0.8 pF; mutual 3 nH }
shield lid { covers B; covers P; covers input; sheet aluminium 0.5 mm; slot 6 mm; grounded }
ambient radio { field 10 V/m from 80 MHz to 1 GHz modulated 80 % }
`;
  it('are read whole', () => {
    check(text);
    const { loops, returns, links, shields, ambients, pairs, complete } = resolved(text);
    assert.equal(complete, true);
    const [loop, path, trace] = loops;
    assert.ok(loop.shape?.form === 'rectangle' && path.shape?.form === 'path' && trace.shape?.form === 'trace');
    close(loop.shape.at?.x.value, 10e-3);
    close(loop.turns[0].angle.value, Math.PI / 2);
    close(path.shape.points[1].z?.value, 1e-3);
    assert.equal(path.stackup, null);
    assert.equal(trace.shape.above.name, 'GND1');
    assert.equal(path.senses[0].signal, pairs.get('P'));
    assert.deepEqual(returns[0].pieces.map(({ form }) => form), ['strip', 'via', 'measured']);
    assert.equal(returns[0].pieces[1].form === 'via' && returns[0].pieces[1].count, 3);
    close(links[0].mutual?.value, 3e-9);
    assert.deepEqual(shields[0].covers.map(({ subject }) => subject.name), ['B', 'P', 'input']);
    assert.equal(shields[0].grounded, true);
    close(ambients[0].modulated?.value, 0.8);
  });
});

describe('families', () => {
  it('give what a net does not state itself', () => {
    const { nets: all, errors } = resolved(`family base { swing 12 V; rise 15 ns; source 4R7; repeats 100 kHz }
family slow is base { rise 50 ns; once }
net A is slow { source 10 ohm; load 1 kohm }
`);
    assert.deepEqual(errors, []);
    const net = all.get('A')!;
    close(net.swing?.value, 12);
    close(net.rise?.value, 50e-9);
    close(net.source?.resistance?.value, 10);
    assert.equal(net.once, true);
    assert.equal(net.repeats, null);
    assert.equal(net.family, 'slow');
  });

  it('lose their tolerance to `tolerates none`, and only that', () => {
    const { nets: all } = resolved('family f { tolerates 1 V peak; tolerates 1 mV rms; band 1 kHz to 1 MHz }\nnet A is f { tolerates none }\nnet B is f { tolerates none; tolerates 2 mV rms }\nnet C is f { tolerates 2 V peak }\n');
    const of = (name: string) => [all.get(name)!.toleratesPeak?.value ?? null, all.get(name)!.toleratesRms?.value ?? null];
    assert.deepEqual(of('A'), [null, null]);
    assert.deepEqual(of('B'), [null, 2e-3]);
    assert.deepEqual(of('C'), [2, 1e-3]);
  });

  it('replace a built-in one of their name', () => {
    const { nets: all } = resolved('family lvcmos33 { swing 3 V }\nnet A is lvcmos33\nnet B is lvcmos25\n');
    close(all.get('A')!.swing?.value, 3);
    assert.equal(all.get('A')!.toleratesPeak, null);
    close(all.get('B')!.swing?.value, 2.5);
  });

  it('built in, are placed where they are named', () => {
    const text = 'net A is lvcmos33 { rise 1 ns }\n';
    const { nets: all } = resolved(text);
    const { start, end } = all.get('A')!.toleratesPeak!.place.span;
    assert.equal(text.slice(start, end), 'lvcmos33');
  });

  it('end in a finding where one is itself', () => {
    check('family a is b { rise 1 ns }\nfamily b is c { fall 1 ns }\nfamily c is a { swing 1 V }\nnet N is a\n', 'bad-value [a]: family a is itself, by way of b, c');
    check('family ttl is ttl { rise 1 ns }\nnet N is ttl\n', 'bad-value [ttl]: family ttl is itself');
  });

  it('of pairs do not fit nets, and the other way round', () => {
    check('net A is lvds { rise 1 ns }\n', 'bad-value [lvds]: lvds has the levels of a pair; net A is a net');
    check('family mine is can { rise 1 ns }\nnet A is mine\n', 'bad-value [mine]: mine has the levels of a pair; net A is a net');
    check('net A { rise 1 ns }\nnet B { rise 1 ns }\npair P is ttl { plus A; minus B }\n', 'bad-value [ttl]: ttl has the levels of a net; pair P is a pair');
  });
});

describe('built-in families', () => {
  // JESD8C.01, JESD8-5, JESD8-7, TTL, TIA/EIA-644-A, TIA/EIA-485-A, ISO 11898-2: the levels as stated beside each family.
  const margins: Readonly<Record<string, readonly [number, number]>> = {
    lvcmos33: [3.3, Math.min(0.8 - 0.2, 3.0 - 0.2 - 2.0)], lvcmos25: [2.5, Math.min(0.7 - 0.2, 2.1 - 1.7)],
    lvcmos18: [1.8, Math.min(0.35 * 1.65 - 0.45, 1.65 - 0.45 - 0.65 * 1.65)], ttl: [5, Math.min(0.8 - 0.4, 2.4 - 2.0)],
    lvds: [0.454, 0.247 - 0.1], rs485: [5, 1.5 - 0.2], can: [1.5, Math.min(1.5 - 0.9, 0.5 - 0.05)],
  };
  for (const [name, [swing, margin]] of Object.entries(margins)) {
    it(name, () => {
      const isPair = ['lvds', 'rs485', 'can'].includes(name);
      const project = resolved(`net A { load 1 kohm }\nnet B { load 1 kohm }\n${isPair ? `pair X is ${name} { plus A; minus B }` : `net X is ${name}`}\n`);
      assert.deepEqual(project.errors, []);
      const signal = (isPair ? project.pairs : project.nets).get('X')!;
      close(signal.swing?.value, swing);
      close(signal.toleratesPeak?.value, margin);
      assert.equal(signal.rise, null);
    });
  }
});

describe('names', () => {
  it('may be anything, __proto__ and constructor among them', () => {
    const text = `${layers}net __proto__ { swing 1 V; rise 1 ns }\nnet constructor { tolerates 1 V peak }\nnet "has own" is toString\nfamily toString { load 1 kohm }\nrun hasOwnProperty on TOP for 1 mm { trace __proto__ 0.2 mm; gap 0.2 mm; trace constructor 0.2 mm; gap 0.2 mm; trace "has own" 0.2 mm }\n`;
    check(text);
    const { nets: all, runs, names } = resolved(text);
    assert.deepEqual([...all.keys()], ['__proto__', 'constructor', 'has own']);
    assert.equal(runs[0].rows[0].conductors.length, 3);
    assert.equal(names.get('signal')!.get('__proto__')!.uses.length, 1);
    assert.deepEqual(found('net valueOf is __proto__\n'), ['unknown-name [__proto__]: no family __proto__']);
  });

  it('are the same quoted or not', () => check(`${layers}net "A" { swing 1 V }\nnet B { load 1 kohm }\nrun r on "TOP" for 1 mm { trace A 0.2 mm; gap 0.2 mm; trace "B" 0.2 mm }\n`));

  it('are recorded where they are declared, used and waived', () => {
    const text = `${layers}${nets}run r on TOP for 1 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\nwaive over-budget on B because "x"\n`;
    const { names } = resolved(text);
    const at = (places: readonly { span: { start: number } }[]) => places.map(({ span }) => text.slice(span.start).split('\n')[0].slice(0, 12));
    const record = names.get('signal')!.get('B')!;
    assert.deepEqual([at(record.declarations), at(record.uses), at(record.waivers)], [['B { source 1'], ['B 0.2 mm }'], ['B because "x']]);
    assert.equal(names.get('layer')!.get('TOP')!.uses.length, 1);
  });

  it('of every set may be shared between sets', () => check(`board GND1 {}\n${layers}net GND1 { load 1 kohm }\nnet TOP { swing 1 V }\nrun TOP on TOP for 1 mm { trace TOP 0.2 mm; gap 0.2 mm; trace GND1 0.2 mm }\n`));
});

describe('the order of declarations', () => {
  it('does not matter', () => {
    const parts = [layers, 'net A is f\n', 'family f { swing 1 V }\n', 'net B { tolerates 1 V peak }\n', 'run r on TOP for 1 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\n', 'shield s { covers l; slot 1 mm; floating }\n', 'loop l on TOP { rectangle 1 mm by 1 mm; senses B }\n'];
    const meaning = (text: string) => {
      const { runs, nets: all, loops, shields, errors } = resolved(text);
      return { errors, runs: runs.map(({ rows }) => rows[0].conductors.map(({ width }) => width.value)), swing: all.get('A')!.swing?.value, loops: loops.length, covers: shields[0].covers[0].subject.name };
    };
    assert.deepEqual(meaning(parts.toReversed().join('')), meaning(parts.join('')));
  });
});
