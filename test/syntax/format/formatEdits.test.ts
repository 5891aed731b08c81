/** What formatting makes of a text, from the fifth chapter of the language's description. Each in LF and CRLF, plain and behind characters of two bytes or units. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { formatEdits, formatted } from '../../../server/src/syntax/format/formatEdits';
import { parse } from '../../../server/src/syntax/parse';

/** Both are written between bars, so that white space at their ends can be seen. */
function becomes(title: string, before: string, after: string): void {
  const [from, to] = [before, after].map((text) => text.replace(/^\n/, '').replace(/\n *$/, '\n').replace(/^ *\|/gm, '').replaceAll('·', ' '));
  for (const ends of ['\n', '\r\n']) {
    for (const prefix of ['', '# 5 µs, 2 Ω 🔌\n']) {
      it(`${title}${ends === '\n' ? '' : ', CRLF'}${prefix === '' ? '' : ', µ Ω 🔌 before'}`, () => {
        assert.equal(formatted((prefix + from).replaceAll('\n', ends)), (prefix + to).replaceAll('\n', ends));
      });
    }
  }
}

const stays = (title: string, text: string) => becomes(title, text, text);

describe('indentation', () => {
  becomes('is two spaces for each block', `
    |run alley for 22 mm {
    |on TOP {
    |\t\ttrace A 0.2 mm
    |      }
    | }
  `, `
    |run alley for 22 mm {
    |  on TOP {
    |    trace A 0.2 mm
    |  }
    |}
  `);
  becomes('of a comment is that of its block', `
    |    # before
    |net A {
    |# within
    |  once
    |      ## last
    |  }
    |   # behind
  `, `
    |# before
    |net A {
    |  # within
    |  once
    |  ## last
    |}
    |# behind
  `);
  becomes('is one more where a statement goes on', `
    |loop l {
    |path (0 mm, 0 mm),
    |(5 mm,
    |  # to the right
    |5 mm), (0 mm, 5 mm)
    |wire 1 mm
    |}
  `, `
    |loop l {
    |  path (0 mm, 0 mm),
    |    (5 mm,
    |    # to the right
    |    5 mm), (0 mm, 5 mm)
    |  wire 1 mm
    |}
  `);
  becomes('puts an opening brace of its own line below its head', `
    |net A
    |  # why
    |    {
    |once
    |  }
  `, `
    |net A
    |# why
    |{
    |  once
    |}
  `);
});

describe('spaces', () => {
  becomes('are one between words, none before marks that take none', `
    |net  A{swing   3 V ;rise\t2 ns;;}  ;net\u00a0B{ }
    |loop l{circle 3 mm at( 1 mm ,2 mm ,3 mm )}
  `, `
    |net A { swing 3 V; rise 2 ns;; }; net B { }
    |loop l { circle 3 mm at (1 mm, 2 mm, 3 mm) }
  `);
  becomes('stand between number and unit and about a tolerance', `
    |stackup { copper A 1oz; prepreg 8mil±10% er 4.2+-0.2 loss 0.018\u2009±\u20095% }
    |net "A""1 mm" { source 4R7±5%,2p2; load 5R; swing 3V3; contact \u221220dB at 5V; noise 5nV/rtHz,2pA/rtHz corner 2e3Hz; band 1.5e-3MHz to 4 MHz }
    |loop l { carries A; circle 3mm at (1mm±2%,2 mm); turned 45° about z }
  `, `
    |stackup { copper A 1 oz; prepreg 8 mil ± 10 % er 4.2 +- 0.2 loss 0.018 ± 5 % }
    |net "A""1 mm" { source 4R7 ± 5 %, 2p2; load 5 R; swing 3V3; contact \u221220 dB at 5 V; noise 5 nV/rtHz, 2 pA/rtHz corner 2e3 Hz; band 1.5e-3 MHz to 4 MHz }
    |loop l { carries A; circle 3 mm at (1 mm ± 2 %, 2 mm); turned 45 ° about z }
  `);
  becomes('are none at the end of a line, and none on one that is empty', `
    |net A {···
    |\t
    |  once··
    |}\u00a0
    |····
  `, `
    |net A {
    |
    |  once
    |}
    |
  `);
  stays('of names, strings and comments are their own', `
    |net "  A\t 1mm  " { once }  #   said    so \t
    |waive over-budget on "  A\t 1mm  " because "seen   on  8mil"
  `);
  stays('of numbers that are names are none', `
    |net 8mil { once }
    |net 3V3 is 5V
  `);
});

describe('columns', () => {
  becomes('hold the first words, padded to the longest that something follows', `
    |shield lid {
    |covers A
    |sheet tin 0.2 mm
    |slot 10 mm
    |grounded
    |}
  `, `
    |shield lid {
    |  covers A
    |  sheet  tin 0.2 mm
    |  slot   10 mm
    |  grounded
    |}
  `);
  becomes('hold the names of a run, and a gap where names are', `
    |run r on TOP for 5 mm {
    |trace R🔌🔌 0.25 mm
    |gap 0.30 mm
    |guard G 0.25 mm stitched 4 mm
    |gap 0.30 mm ± 5 %
    |trace RX_IN 0.15 mm after 12 mm
    |}
  `, `
    |run r on TOP for 5 mm {
    |  trace R🔌🔌   0.25 mm
    |  gap   0.30 mm
    |  guard G     0.25 mm stitched 4 mm
    |  gap   0.30 mm ± 5 %
    |  trace RX_IN 0.15 mm after 12 mm
    |}
  `);
  becomes('hold the names of a stackup, and thicknesses that more follows', `
    |stackup {
    |mask 25 um er 3.4 # film
    |copper TOP 35um
    |prepreg 0.20mm±10% er 4.2 loss 0.018
    |plane GND 18 um
    |copper BOTTOM 35 um undercut 8 um # per side
    |}
  `, `
    |stackup {
    |  mask    25 um er 3.4                 # film
    |  copper  TOP     35 um
    |  prepreg 0.20 mm ± 10 % er 4.2 loss 0.018
    |  plane   GND     18 um
    |  copper  BOTTOM  35 um undercut 8 um  # per side
    |}
  `);
  becomes('leave out what has several leading words', `
    |board b {
    |headroom 6 dB
    |emits at most 40 dBuV/m at 3 m from 30 MHz to 88 MHz
    |combine rss
    |}
    |pair P {
    |plus A
    |common tolerates 0.5 V peak
    |both ways
    |switches with G
    |}
  `, `
    |board b {
    |  headroom 6 dB
    |  emits at most 40 dBuV/m at 3 m from 30 MHz to 88 MHz
    |  combine  rss
    |}
    |pair P {
    |  plus     A
    |  common tolerates 0.5 V peak
    |  both ways
    |  switches with G
    |}
  `);
  becomes('end at a blank line, a line of comment, a block, and a statement over several lines', `
    |net A {
    |source 5 ohm
    |rise 1 ns
    |
    |rise 1 ns
    |fall 1 ns
    |# slow
    |tolerates 1 V peak
    |band 1 Hz to 2 Hz
    |}
    |run r for 5 mm {
    |without GND
    |on TOP { trace A 1 mm }
    |on L3 {
    |gap 1 mm
    |}
    |waive syntax because "x"
    |}
    |net B {
    |rise 1 ns
    |load 10 kohm,
    |5 pF
    |tolerates 1 V peak
    |}
  `, `
    |net A {
    |  source 5 ohm
    |  rise   1 ns
    |
    |  rise 1 ns
    |  fall 1 ns
    |  # slow
    |  tolerates 1 V peak
    |  band      1 Hz to 2 Hz
    |}
    |run r for 5 mm {
    |  without GND
    |  on TOP { trace A 1 mm }
    |  on L3 {
    |    gap 1 mm
    |  }
    |  waive syntax because "x"
    |}
    |net B {
    |  rise 1 ns
    |  load 10 kohm,
    |    5 pF
    |  tolerates 1 V peak
    |}
  `);
  becomes('pass over a line of several statements', `
    |net A {
    |source 5 ohm
    |rise 1 ns; tolerates 2 mV peak
    |rise 1 ns;
    |}
  `, `
    |net A {
    |  source 5 ohm
    |  rise 1 ns; tolerates 2 mV peak
    |  rise   1 ns;
    |}
  `);
});

describe('comments behind a line', () => {
  becomes('stand in one column, two spaces beyond the longest line that has one', `
    |net A {
    |swing 3 V # a
    |both ways
    |rise 40 ns ± 12.5 % # b
    |load 10 kohm, 5 pF ± 12.5 %
    |source 5 ohm    # c
    |}
  `, `
    |net A {
    |  swing  3 V             # a
    |  both ways
    |  rise   40 ns ± 12.5 %  # b
    |  load   10 kohm, 5 pF ± 12.5 %
    |  source 5 ohm           # c
    |}
  `);
  becomes('stand in one column behind declarations on lines of their own, and behind each brace by itself', `
    |quietrun 1 # version
    |use "a.quiet"# from afar
    |net A { once }# first
    |net LONG_NAME { once } # second
    |net B { # opens
    |once
    |} # closes
  `, `
    |quietrun 1              # version
    |use "a.quiet"           # from afar
    |net A { once }          # first
    |net LONG_NAME { once }  # second
    |net B {  # opens
    |  once
    |}  # closes
  `);
});

describe('a line with an error', () => {
  becomes('stays as it is, and the columns about it stand as if it were in order', `
    |run r on TOP for 5 mm {
    |trace A 0.2 mm
    |      gap  0.3   furlong   # half done··
    |trace SENSE_LINE 0.2 mm # so
    |  gapp   0.3 mm    # half done··
    |trace B 0.2 mm # too
    |}
  `, `
    |run r on TOP for 5 mm {
    |  trace A          0.2 mm
    |      gap  0.3   furlong   # half done··
    |  trace SENSE_LINE 0.2 mm  # so
    |  gapp   0.3 mm    # half done··
    |  trace B          0.2 mm  # too
    |}
  `);
  becomes('is the line only, not the statement that goes on', `
    |net A {
    |load  5 ohm,
    |  5   oops
    |}
  `, `
    |net A {
    |  load 5 ohm,
    |  5   oops
    |}
  `);
  becomes('and stray text stay, up to the next declaration', `
    |net A {
    |once
    |}
    | }  what
    |   is   this
    |  net   B { once }
  `, `
    |net A {
    |  once
    |}
    | }  what
    |   is   this
    |net B { once }
  `);
  becomes('is that which lacks a brace, too', `
    |net A {
    |once
    |  swing   3 V
    |net B   { once }
  `, `
    |net A {
    |  once
    |  swing   3 V
    |net B { once }
  `);
});

describe('the text as a whole', () => {
  it('ends with a newline, of its own kind', () => {
    assert.deepEqual(['', '  ', 'net A', 'net A is F', 'net A is F  ', 'use "a"\r\nnet A is F', '# said ', 'net A {'].map(formatted), ['', '', 'net A', 'net A is F\n', 'net A is F\n', 'use "a"\r\nnet A is F\r\n', '# said \n', 'net A {']);
  });

  it('keeps its byte-order mark, its carriage returns and its tabs in strings', () => {
    assert.equal(formatted('\ufeff  net A\tis F\r\r\n\n waive syntax on A because "a\tb"'), '\ufeffnet A is F\r\r\nwaive syntax on A because "a\tb"\r'.replace('\r\r\n', '\r\r\n\n'));
  });

  it('keeps what parts a carriage return from a line feed', () => {
    assert.equal(formatted('net A is F\r  \nnet B is F\r\n  \n  \r'), 'net A is F\r  \nnet B is F\r\n\n\r');
  });

  it('is edited only where it differs', () => {
    const text = 'net A { once }\nnet  B { once }\nnet C { once } \n';
    assert.deepEqual(formatEdits(parse(text)), [{ span: { start: 18, end: 20 }, newText: ' ' }, { span: { start: 45, end: 46 }, newText: '' }]);
    assert.deepEqual(formatEdits(parse(formatted(text))), []);
  });
});
