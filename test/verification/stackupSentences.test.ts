/**
 * Sentences of the language reference on stackups, each with a board that must differ from, or equal, another if it is obeyed.
 * Expected relations follow from electrostatics alone: equal geometry gives equal matrices, more dielectric more capacitance.
 */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { checkedRun, checkedText, type RunReport } from '../support/checkedText';
import { near } from '../support/near';

const pair = 'trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm';
const solved = (rows: string, run: string = `on TOP { ${pair} }`) => checkedRun(`stackup { ${rows} }\nnet A {}\nnet B {}\nrun r for 10 mm {\n${run}\n}\n`);

function same(one: RunReport, other: RunReport, tolerance = 1e-9): void {
  for (const key of ['capacitance', 'capacitanceInAir', 'inductance'] as const) one[key]!.forEach((row, i) => row.forEach((value, j) => near(other[key]![i]![j]!, value, tolerance, `${key}[${i}][${j}]`)));
}
const c11 = (run_: RunReport) => run_.capacitance![0]![0]!;
function differ(one: RunReport, other: RunReport, least = 5e-3): void {
  assert.ok(least < Math.abs(c11(one) / c11(other) - 1), `${c11(one)} and ${c11(other)} ought to differ`);
}

const bare = 'copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um';

describe('rows of a stackup', () => {
  it('`dielectric`, `core` and `prepreg` are insulating rows: alone over a plane they are the same', async () => {
    for (const word of ['dielectric', 'core']) same(await solved(bare), await solved(bare.replace('prepreg', word)));
  });

  it('`loss` is read but not yet used', async () => same(await solved(bare), await solved(bare.replace('er 4.2', 'er 4.2 loss 0.02'))));

  it('a copper row takes its own height, an insulating row is what lies between copper rows after pressing', async () => {
    // Copper that the run does not use adds its height to the laminate, all of it fill.
    same(await solved('copper TOP 35 um; prepreg 0.1 mm er 4.2; copper IN 50 um; prepreg 0.15 mm er 4.2; plane GND 18 um'), await solved(bare.replace('0.2 mm', '0.3 mm')), 1e-6);
  });

  it('a plane is at zero potential, whatever its thickness, and what lies beyond it does not matter', async () => {
    same(await solved(bare), await solved(`${bare.replace('18 um', '70 um')}; core 1 mm er 9; copper BOTTOM 35 um; mask 25 um er 3`));
  });

  it('a run refers to the nearest plane above its uppermost and below its lowermost layer', async () => {
    const inner = `on IN { ${pair} }`;
    const buried = 'plane UP 18 um; prepreg 0.3 mm er 4.2; copper IN 35 um; core 0.2 mm er 4.2; plane DOWN 18 um';
    same(await solved(buried, inner), await solved(`copper TOP 35 um; prepreg 0.1 mm er 3; ${buried}; core 1 mm er 9; plane LAST 18 um`, inner));
    differ(await solved(buried, inner), await solved(buried.replace('plane UP 18 um; ', 'copper TOP 35 um; '), inner));
  });

  it('equal dielectrics make one: where the cut lies does not matter', async () => {
    same(await solved(bare), await solved(bare.replace('prepreg 0.2 mm er 4.2', 'prepreg 0.05 mm er 4.2; core 0.15 mm er 4.2')), 1e-6);
  });

  it('tolerances leave the nominal value where it is', async () => same(await solved(bare), await solved(bare.replace('0.2 mm er 4.2', '0.2 mm ± 10 % er 4.2 +- 0.2'))));

  it('units are what they say: mils, inches, ounces', async () => {
    same(await solved(bare), await solved('copper TOP 1 oz; prepreg 7.874015748 mil er 4.2; plane GND 18 um'), 1e-6);
  });
});

describe('what fills beside a trace', () => {
  const inner = (above: string, below: string) => solved(`plane UP 18 um; ${above} 0.2 mm er 3.4; copper IN 70 um; ${below} 0.2 mm er 4.8; plane DOWN 18 um`, `on IN { ${pair} }`);
  /** The mutual rises with the dielectric of the space between the traces. */
  const mutual = (run_: RunReport) => -run_.capacitance![0]![1]!;

  it('is the adjacent prepreg, else the row above', async () => {
    const [fillAbove, fillBelow, neither, both] = [await inner('prepreg', 'core'), await inner('core', 'prepreg'), await inner('core', 'core'), await inner('prepreg', 'prepreg')];
    assert.ok(mutual(fillAbove) * 1.1 < mutual(fillBelow), 'er 3.4 between them against er 4.8');
    near(mutual(neither), mutual(fillAbove), 1e-9, 'two cores: the row above');
    near(mutual(both), mutual(fillAbove), 1e-9, 'two prepregs: the row above of them');
    near(mutual(await inner('dielectric', 'prepreg')), mutual(fillBelow), 1e-9, 'a dielectric is no prepreg');
    near(mutual(await inner('dielectric', 'dielectric')), mutual(fillAbove), 1e-9, 'two dielectrics');
  });

  it('is air beside an outer trace, or the mask, never the laminate', async () => {
    const masked = await solved(`mask 25 um er 3.4; ${bare}`);
    const thicker = await solved(`mask 40 um er 3.4; ${bare}`);
    assert.ok(c11(await solved(bare)) < c11(masked) && c11(masked) < c11(thicker));
    same(await solved(bare), await solved(`mask 25 um er 1; ${bare}`), 1e-4);
  });

  it('`flat`: planar, its thickness above the copper\'s top: it fills the gap, so the mutual is larger than under one that follows', async () => {
    const follows = await solved(`mask 25 um er 3.4; ${bare}`);
    const flat = await solved(`mask 25 um er 3.4 flat; ${bare}`);
    assert.ok(mutual(follows) * 1.02 < mutual(flat));
    // The film that follows is 25 um on the laminate: a flat one whose top lies there would be thinner than the copper.
    differ(flat, await solved(`mask 60 um er 3.4 flat; ${bare}`), 1e-3);
  });

  it('a mask lies on whichever face it is written at', async () => {
    const below = 'plane GND 18 um; prepreg 0.2 mm er 4.2; copper TOP 35 um; mask 25 um er 3.4';
    same(await solved(`mask 25 um er 3.4; ${bare}`), await solved(below));
  });
});

describe('undercut', () => {
  it('is per side and takes from the top of the trace, so that its foot keeps the stated width', async () => {
    const straight = await solved(bare);
    const cut = await solved(bare.replace('35 um', '35 um undercut 15 um'));
    const foot = await solved(bare, 'on TOP { trace A 0.17 mm; gap 0.23 mm; trace B 0.17 mm }');
    assert.ok(c11(foot) < c11(cut) && c11(cut) < c11(straight), 'between a trace as wide as its foot and one as wide as its top');
    // The foot, beside the plane, is what counts most: the change is the smaller part of that of the whole width.
    assert.ok(c11(straight) - c11(cut) < (c11(straight) - c11(foot)) / 2);
  });

  it('leaves the wide face on the adjacent core, else on the side that faces the middle of the board', async () => {
    const rows = (above: string, below: string) => `plane UP 18 um; ${above} 0.1 mm er 4.2; copper IN 70 um undercut 40 um; ${below} 0.4 mm er 4.2; plane DOWN 18 um`;
    const one = 'on IN { trace A 0.3 mm }';
    const onCoreAbove = await solved(rows('core', 'prepreg'), one);
    const onCoreBelow = await solved(rows('prepreg', 'core'), one);
    assert.ok(c11(onCoreBelow) * 1.03 < c11(onCoreAbove), 'the near plane lies above: a wide face there has more capacitance');
    // IN lies in the upper half, so that the middle is below it.
    same(await solved(rows('prepreg', 'prepreg'), one), onCoreBelow);
  });

  it('over half the width cannot be', async () => {
    const { status, file } = await checkedText(`stackup { ${bare.replace('35 um', '35 um undercut 110 um')} }\nnet A {}\nrun r on TOP for 10 mm { trace A 0.2 mm }`);
    assert.equal(status, 1);
    assert.deepEqual(file.findings.filter(({ severity }) => severity === 'error').map(({ rule }) => rule), ['bad-value']);
  });
});
