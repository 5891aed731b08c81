/** What the resolver says of names and values: one finding a mistake, at the words that have to change. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { check, layers, nets, resolved } from './resolved';

const run = (rows: string, head = 'run r on TOP for 20 mm') => `${layers}${nets}${head} {\n${rows}\n}\n`;
const rows = 'trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm';

describe('unknown-name', () => {
  it('suggests what was probably meant', () => {
    check(run(rows, 'run r on TPO for 20 mm'), 'unknown-name [TPO]: no layer TPO; TOP?');
    check(run('trace A 0.2 mm; gap 0.2 mm; trace b 0.2 mm'), 'unknown-name [b]: no net b; B?');
    check(`${layers}${nets}run r on TOP for 20 mm { ${rows}; without GND }\n`, 'unknown-name [GND]: no plane GND; GND1?');
    check('net A is lvmcos33\n', 'unknown-name [lvmcos33]: no family lvmcos33; lvcmos33?');
    check(run(rows, 'run r on INNER for 20 mm'), 'unknown-name [INNER]: no layer INNER');
  });

  it('says what a name of another kind is', () => {
    check(run(rows, 'run r on GND1 for 20 mm'), 'unknown-name [GND1]: GND1 is a plane; a layer fits here');
    check(run(`${rows}; without TOP`), 'unknown-name [TOP]: TOP is a copper layer; a plane fits here');
    check(`${layers}${nets}pair P { plus A; minus B }\nrun r on TOP for 1 mm { trace P 0.2 mm }\n`, 'unknown-name [P]: P is a pair; a net fits here');
  });

  it('mends with a correction that is quoted where it has to be', () => {
    const { errors } = resolved('net "RX IN" { load 1 kohm }\nnet B { load 1 kohm }\nlink l { between "RX_IN" and B; capacitance 1 pF }\n');
    assert.deepEqual(errors.map(({ corrections }) => corrections.map(({ title, newText }) => [title, newText])), [[['Change to RX IN', '"RX IN"']]]);
  });

  it('says which of a range are not there', () =>
    check(`${layers}net D[0..3] { swing 1 V }\nrun r on TOP for 1 mm { trace D[0..7] 0.1 mm spaced 0.1 mm }\n`, 'unknown-name [D[0..7]]: no net D4, D5, D6, D7'));

  it('asks for a stackup once, and only where a layer is named', () => {
    check(`${nets}run r on TOP for 20 mm { ${rows} }\nrun s on BOTTOM for 20 mm { ${rows}; without GND }\n`, 'missing-value [TOP]: a stackup is missing: TOP is named here, and nothing says which layers there are');
    check(`${nets}link l { between A and B; capacitance 1 pF }\nloop l { rectangle 1 mm by 1 mm; senses B }\nreturn r { measured 1 mohm; carries A; refers B }\n`);
  });

  it('looks for groups among those that switch', () => {
    check('net A { swing 1 V; switches with GATES }\nnet B { tolerates 1 V peak; samples 2 us after GATES }\n');
    check('net A { swing 1 V; switches with GATES }\nnet B { tolerates 1 V peak; samples 2 us after GATE }\n', 'unknown-name [GATE]: no net switches with GATE; GATES?');
  });

  it('looks for the subject of a waiver among everything declared', () => {
    check(`${layers}${nets}${'loop coil on TOP { rectangle 1 mm by 1 mm }\n'}waive over-budget on B because "x"\nwaive outside-model on coil because "x"\n`);
    check(`${nets}waive over-budget on C because "x"\n`, 'unknown-name [C]: no declaration of C');
  });

  it('is not said while a head or a `use` cannot be read', () => {
    const spoilt = run('trace X 0.2 mm');
    check(`${spoilt}net { swing 1 V }\n`.replace('net {', 'nett Q {'), 'syntax [nett]: `nett`? net');
    check(`use "gone.quiet"\n${spoilt}`, 'include ["gone.quiet"]: there is no file "gone.quiet"');
    check(`${spoilt}`, 'unknown-name [X]: no net X');
  });

  it('counts names in an unreadable line as declared', () => check(run('trace X 0.2 m m'), 'syntax [m]: `m` does not fit here; fits: `reversed`, `after` or `spaced`'));
});

describe('duplicate-name', () => {
  it('of declarations names the first', () => {
    const text = 'net A { swing 1 V }\nnet A { swing 2 V }\n';
    check(text, 'duplicate-name [A]: A is declared twice');
    const [error] = resolved(text).errors;
    assert.deepEqual(error.related.map(({ place }) => place.span.start), [4]);
    assert.equal(error.place.span.start, 24);
    assert.equal(resolved(text).nets.get('A')!.swing!.value, 1);
  });

  it('of a range says which', () => check('net D3 { swing 1 V }\nnet D[0..7] { swing 1 V }\n', 'duplicate-name [D[0..7]]: D3 is declared twice'));

  it('holds for nets, pairs and loops together', () => check(`${nets}pair A { plus A; minus B }\n`, 'duplicate-name [A]: A is declared twice'));

  it('of layers holds over all stackups', () => check(`${layers}stackup flex { copper TOP 18 um; dielectric 50 um er 3.2; plane F 18 um }\n`, 'duplicate-name [TOP]: TOP is declared twice'));

  it('of a stackup that was pasted twice is one finding', () => check(layers + layers, 'duplicate-name [stackup]: one stackup may be without a name; a second one needs one'));

  it('of boards is one a project', () => check('board a { }\nboard b { }\n', 'duplicate-name [b]: a project has one board'));

  it('of properties', () => {
    check('net A { swing 1 V; rise 1 ns; swing 2 V }\n', 'duplicate-name [swing]: swing is stated twice in net A');
    check('net A { tolerates 1 V peak; tolerates 1 mV rms; tolerates 2 V peak; band 1 kHz to 1 MHz }\n', 'duplicate-name [tolerates]: tolerates … peak is stated twice in net A');
    check('net A { swing 1 V; once; repeats 1 kHz }\n', 'duplicate-name [repeats]: repeats contradicts once in net A');
    check('loop l { circle 2 mm; rectangle 1 mm by 1 mm }\n', 'duplicate-name [rectangle]: shape is stated twice in loop l');
    check('shield s { slot 1 mm; grounded; floating }\n', 'duplicate-name [floating]: floating contradicts grounded in shield s');
    check('board b { emits at most 1 mV/m at 3 m from 30 MHz to 88 MHz; emits at most 1 mV/m at 3 m from 88 MHz to 1 GHz }\n');
  });

  it('of the rows of a run', () => check(run(`on TOP { ${rows} }\non TOP { trace B 0.2 mm }`, 'run r for 20 mm'), 'duplicate-name [TOP]: TOP stands twice in run r: each layer has one row'));

  it('of what a loop carries', () => check(`${nets}loop l { circle 2 mm; carries A; carries A 1 A }\n`, 'duplicate-name [A]: A stands twice after carries in loop l'));
});

describe('missing-value', () => {
  it('of a row says what belongs where', () => {
    check(run('trace A 0.2 mm\ntrace B 0.2 mm'), 'missing-value [A 0.2 mm]: a gap belongs between A and B');
    check(run(`gap 0.2 mm\n${rows}`), 'missing-value [0.2 mm]: a row starts with a conductor: one belongs before this gap');
    check(run(`${rows}\ngap 0.2 mm`), 'missing-value [0.2 mm]: a row ends with a conductor: one belongs after this gap');
    check(run('trace A 0.2 mm; gap 0.2 mm; gap 0.3 mm; trace B 0.2 mm'), 'missing-value [0.2 mm]: a conductor belongs between two gaps');
    check(run('trace A 0.2 mm\nguard GND 0.2 mm\ntrace B 0.2 mm'), 'missing-value [A 0.2 mm]: a gap belongs between A and GND', 'missing-value [GND 0.2 mm]: a gap belongs between GND and B');
  });

  it('of a run', () => {
    check(run(rows, 'run r on TOP'), 'missing-value [TOP]: length is missing: `for` and a length such as `38 mm`');
    check(run(rows, 'run r for 20 mm'), 'missing-value [r]: layer of run r is missing: such as `on TOP`');
    check(`${layers}net D[0..7] { swing 1 V }\nrun r on TOP for 1 mm { trace D[0..7] 0.1 mm }\n`, 'missing-value [D[0..7] 0.1 mm]: spacing of D[0..7] is missing: such as `spaced 0.12 mm`');
    check(run(''));
  });

  it('of a stackup', () => {
    check('stackup { copper TOP 35 um; core 1 mm; copper BOTTOM 35 um }\n', 'missing-value [1 mm]: er of core is missing: its relative permittivity, such as `er 4.2`');
    check('stackup { copper TOP 35 um; plane GND 35 um }\n', 'missing-value [TOP 35 um]: an insulating row belongs between TOP and GND: such as `prepreg 0.2 mm er 4.2`');
  });

  it('of everything that has a required part', () => {
    check(`${nets}pair P { plus A }\n`, 'missing-value [P]: minus of pair P is missing: one of its two nets, such as `minus P_N`');
    check('shield s { grounded }\n', 'missing-value [s]: slot of shield s is missing: its longest opening, such as `slot 6 mm`');
    check('shield s { slot 1 mm }\n', 'missing-value [s]: grounding of shield s is missing: `grounded` or `floating`');
    check('loop l { strip 1 mm }\n', 'missing-value [l]: shape of loop l is missing: a rectangle, circle, path or trace, such as `rectangle 22 mm by 9 mm`');
    check('loop l { path (0 mm, 0 mm) (1 mm, 0 mm) }\n', 'missing-value [(0 mm, 0 mm) (1 mm, 0 mm)]: corner of loop l is missing: a path has three at least, such as `(0 mm, 0 mm) (9 mm, 0 mm) (9 mm, 5 mm)`');
    check(`${layers}loop l { trace 1 mm above GND1 }\n`, 'missing-value [l]: layer of loop l is missing: the layer that its trace lies on, such as `on TOP`');
    check('link l { capacitance 1 pF }\n', 'missing-value [l]: between of link l is missing: two nets, such as `between A and B`');
    check(`${nets}link l { between A and B }\n`, 'missing-value [l]: coupling of link l is missing: such as `capacitance 0.8 pF` or `mutual 3 nH`');
    check(`${nets}return r { carries A; refers B }\n`, 'missing-value [r]: piece of return r is missing: such as `strip 30 mm by 1.5 mm on TOP`, `via drill 0.3 mm` or `measured 2 mohm`');
    check('return r { via drill 0.3 mm }\n', 'missing-value [drill 0.3 mm]: length of the via in return r is missing: such as `length 1.6 mm`, as there is no stackup to take it from'.replace('[drill 0.3 mm]', '[0.3 mm]'));
    check('ambient a { }\n', 'missing-value [a]: field of ambient a is missing: such as `field 10 V/m from 80 MHz to 1 GHz`');
    check('net A { tolerates 1 mV rms }\n', 'missing-value [1 mV]: a tolerance in rms needs the band that it is measured in: such as `band 10 kHz to 4 MHz`');
    check(`${nets}waive over-budget on B because " "\n`, 'missing-value [" "]: the reason is missing: a waiver says why, such as `"0.9 mV measured on revision B"`');
  });
});

describe('bad-value', () => {
  const net = (property: string) => `net A { ${property} }\n`;
  it('of widths, gaps, thicknesses and lengths of nothing or less', () => {
    check(run('trace A 0 mm; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [0 mm]: width of A in run r cannot be 0 mm: it has to be more than zero');
    check(run('trace A 0.2 mm; gap 0 mm; trace B 0.2 mm'), 'bad-value [0 mm]: gap between A and B in run r cannot be 0 mm: it has to be more than zero');
    check(run('trace A 0.2 mm; gap -0.1 mm; trace B 0.2 mm'), 'bad-value [-0.1 mm]: gap between A and B in run r cannot be -0.1 mm: it has to be more than zero');
    check(run(rows, 'run r on TOP for -20 mm'), 'bad-value [-20 mm]: length of run r cannot be -20 mm: it has to be more than zero');
    check(run('trace A 0.2 mm after -1 mm; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [-1 mm]: length before A in run r cannot be -1 mm: it cannot be below zero');
    check('stackup { copper TOP 0 um }\n', 'bad-value [0 um]: thickness of TOP cannot be 0 um: it has to be more than zero');
  });

  it('of times and resistances', () => {
    check(net('rise 0 ns'), 'bad-value [0 ns]: rise of net A cannot be 0 ns: it has to be more than zero');
    check(net('fall -1 ns'), 'bad-value [-1 ns]: fall of net A cannot be -1 ns: it has to be more than zero');
    check(net('source -5 ohm'), 'bad-value [-5 ohm]: source resistance of net A cannot be -5 ohm: it cannot be below zero');
    check(net('load 1 kohm, -5 pF'), 'bad-value [-5 pF]: load capacitance of net A cannot be -5 pF: it cannot be below zero');
    check(net('source 0 ohm; load 0 ohm'));
    check(net('tolerates 0 V peak'), 'bad-value [0 V]: tolerance of net A cannot be 0 V: it has to be more than zero');
  });

  it('of permittivity below that of vacuum', () => check('stackup { copper TOP 1 oz; core 1 mm er 0.9 }\n', 'bad-value [0.9]: er of core cannot be 0.9: it has to be at least 1, that of vacuum'));

  it('of a band upside down, with the way to turn it', () => {
    const text = net('tolerates 1 mV rms; band 4 MHz to 10 kHz');
    check(text, 'bad-value [4 MHz to 10 kHz]: the band of net A is upside down: its lower frequency stands first');
    assert.equal(resolved(text).errors[0].corrections[0].newText, '10 kHz to 4 MHz');
    check(net('tolerates 1 mV rms; band 4 MHz to 4 MHz'), 'bad-value [4 MHz to 4 MHz]: the band of net A has no width');
    check('ambient a { field 1 V/m from 1 GHz to 80 MHz }\n', 'bad-value [1 GHz to 80 MHz]: ambient a is upside down: its lower frequency stands first');
    check(net('band 0 Hz to 1 MHz; noise 5 nV/rtHz corner 1 kHz'), 'bad-value [0 Hz]: noise with a corner has no end towards 0 Hz: the band has to begin above it');
  });

  it('of an undercut over half the width', () => {
    const board = (undercut: string) => `stackup { copper TOP 35 um undercut ${undercut}; core 1 mm er 4.4; plane GND 35 um }\n${nets}run r on TOP for 1 mm { ${rows} }\n`;
    check(board('100 um'));
    check(board('101 um'), 'bad-value [0.2 mm]: the undercut of TOP is over half the width of A', 'bad-value [0.2 mm]: the undercut of TOP is over half the width of B');
  });

  it('of tolerances as large as the value', () => {
    check(run('trace A 0.2 mm ± 100 %; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [± 100 %]: a tolerance stays below 100 %');
    check(run('trace A 0.2 mm ± 0.3 mm; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [± 0.3 mm]: a tolerance stays below 100 %');
  });

  it('of magnitudes beyond anything built', () => {
    check(run('trace A 1e300 mm; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [1e300 mm]: width of A in run r cannot be 1e300 mm: from 1 nm to 1 m in a cross-section are understood');
    check(run(rows, 'run r on TOP for 1e300 m'), 'bad-value [1e300 m]: length of run r cannot be 1e300 m: lengths from 1 pm to 1000 km are understood');
    check(net('rise 1e-300 s'), 'bad-value [1e-300 s]: rise of net A cannot be 1e-300 s: times from 1e-18 s to 1e9 s are understood');
    check(net('swing 1e999 V'), 'bad-value [1e999 V]: this number is too large to compute with');
    check(net('swing -1e300 V'), 'bad-value [-1e300 V]: swing of net A cannot be -1e300 V: voltages from 1 fV to 1 GV are understood');
  });

  it('of cycles that are too short for their edges', () => {
    check(net('swing 1 V; rise 4 ns; fall 4 ns; repeats 100 MHz'));
    check(net('swing 1 V; rise 4.1 ns; repeats 100 MHz'), 'bad-value [100 MHz]: a cycle is too short for one rise and one fall from 0 to 100 %');
    check(net('repeats 1 MHz duty 100 %'), 'bad-value [100 %]: duty of net A cannot be 100 %: it has to be below 100 %');
  });

  it('of nets that are shorter than their runs', () => {
    const text = (length: string, after = '') => `${layers}net A { length ${length} }\nrun r on TOP for 20 mm { trace A 0.2 mm${after} }\n`;
    check(text('20 mm'));
    check(text('60 mm', ' after 40 mm'));
    check(text('19 mm'), 'bad-value [A]: A is shorter in all than its way to the end of run r');
    check(text('60 mm', ' after 41 mm'), 'bad-value [A]: A is shorter in all than its way to the end of run r');
  });

  it('of runs over two boards', () => {
    const flex = 'stackup flex { copper F1 18 um; dielectric 50 um er 3.2; plane FG 18 um }\n';
    check(`${flex}${run(`on TOP { ${rows} }\non F1 { trace B 0.2 mm }`, 'run r for 20 mm')}`, 'bad-value [F1]: run r lies in the unnamed stackup; this is a layer of stackup flex');
    check(`${flex}${run(`${rows}; without FG`)}`, 'bad-value [FG]: run r lies in the unnamed stackup; this is a layer of stackup flex');
  });

  it('of rows where they do not belong', () => {
    check('stackup { copper TOP 1 oz; core 1 mm er 4; mask 25 um er 3; core 1 mm er 4; copper BOT 1 oz }\n', 'bad-value [mask]: mask covers the outside of a board: it is the first or the last row');
    check(run(`on TOP { shift 1 mm; ${rows} }`, 'run r for 20 mm'), 'bad-value [1 mm]: the first row is what the others are shifted from: it cannot be shifted itself');
    check(run('trace A 0.2 mm spaced 0.1 mm; gap 0.2 mm; trace B 0.2 mm'), 'bad-value [0.1 mm]: A is one trace: `spaced` is for a range such as `D[0..7]`');
    check(run(`${rows}\non BOTTOM { trace A 0.2 mm }`), 'syntax [on]: the head of run r names its layer: a row on another layer belongs in a run without `on` in its head');
    check(`${nets}pair P { plus A; minus A }\n`, 'bad-value [minus A]: A cannot be both nets of pair P');
    check(`${nets}link l { between A and A; mutual 1 nH }\n`, 'bad-value [between A and A]: link l couples A with itself');
    check('return r { via 1000001 drill 0.3 mm length 1 mm }\n', 'bad-value [1000001]: vias in parallel are counted from 1 to a million');
  });
});
