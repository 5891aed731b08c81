import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { runSections } from '../../server/src/budget/runs/runSection';
import { sectionKey } from '../../server/src/budget/solveCache';
import type { Section } from '../../server/src/physics/section/section';
import { projectOf } from './project';

const fourLayers = `
  copper  TOP    35 um
  prepreg 0.2 mm er 4.2
  plane   GND1   18 um
  core    1.1 mm er 4.4
  plane   PWR    18 um
  prepreg 0.2 mm er 4.2
  copper  BOTTOM 35 um
`;

function sectionsOf(stackup: string, run: string): readonly Section[] {
  const project = projectOf(`stackup { ${stackup} }\nnet A { swing 1 V; rise 1 ns }\nnet B { tolerates 1 V peak }\n${run}\n`);
  assert.deepEqual(project.errors.map(({ message }) => message), []);
  return runSections(project.runs[0]).map(({ section }) => section);
}

function sectionOf(stackup: string, run: string): Section {
  const sections = sectionsOf(stackup, run);
  assert.equal(sections.length, 1);
  return sections[0];
}

const pairOn = (layer: string) => `run r on ${layer} for 10 mm { trace A 0.2 mm; gap 0.3 mm; trace B 0.15 mm }`;

/** In micrometres and to a nanometre, so that a line shows a section. */
function shown({ layers, planeBelow, planeAbove, conductors, film }: Section) {
  const um = (metres: number) => (metres === Infinity ? Infinity : Math.round(metres * 1e9) / 1e3);
  return {
    below: planeBelow ? 'plane' : 'open',
    layers: layers.map(({ permittivity, thickness }) => [permittivity, um(thickness)]),
    above: planeAbove ? 'plane' : 'open',
    conductors: conductors.map(({ role, x, y, width, height, undercut }) => [role, um(x), um(y), um(width), um(height), um(undercut)]),
    ...(film === null ? {} : { film: [film.side, film.permittivity, um(film.thickness)] }),
  };
}

describe('the section of a run (language reference, "stackup" and "run")', () => {
  it('over a plane: the laminate, then air; the trace on the laminate', () => {
    assert.deepEqual(shown(sectionOf(fourLayers, pairOn('TOP'))), {
      below: 'plane', layers: [[4.2, 200], [1, Infinity]], above: 'open',
      conductors: [['signal', 0, 200, 200, 35, 0], ['signal', 500, 200, 150, 35, 0]],
    });
  });

  it('on the underside is the same section as on top', () => {
    assert.equal(sectionKey(sectionOf(fourLayers, pairOn('BOTTOM'))), sectionKey(sectionOf(fourLayers, pairOn('TOP'))));
  });

  it('under a mask that follows the copper has a film, under a flat one a layer of mask and copper', () => {
    const masked = sectionOf(`mask 25 um er 3.4\n${fourLayers}`, pairOn('TOP'));
    assert.deepEqual(shown(masked).film, ['above', 3.4, 25]);
    assert.deepEqual(shown(masked).layers, [[4.2, 200], [1, Infinity]]);
    const flat = sectionOf(`mask 25 um er 3.4 flat\n${fourLayers}`, pairOn('TOP'));
    assert.deepEqual(shown(flat).layers, [[4.2, 200], [3.4, 60], [1, Infinity]]);
    assert.equal(flat.film, null);
  });

  it('with a film on the underside is turned, too', () => {
    const mask = 'mask 25 um er 3.4\n';
    assert.equal(sectionKey(sectionOf(`${fourLayers}${mask}`, pairOn('BOTTOM'))), sectionKey(sectionOf(`${mask}${fourLayers}`, pairOn('TOP'))));
  });

  const inner = `
    plane   GND1 18 um
    core    0.3 mm er 4.4
    copper  S1   17 um
    prepreg 0.2 mm er 4
    copper  S2   17 um
    core    0.3 mm er 4.4
    plane   GND2 18 um
  `;

  it('inside: the copper takes its own height, and the adjacent prepreg fills beside it, above or below', () => {
    assert.deepEqual(shown(sectionOf(inner, pairOn('S1'))), {
      below: 'plane', layers: [[4.4, 300], [4, 234], [4.4, 300]], above: 'plane',
      conductors: [['signal', 0, 517, 200, 17, 0], ['signal', 500, 517, 150, 17, 0]],
    });
    assert.equal(shown(sectionOf(inner, pairOn('S2'))).conductors[0][2], 300);
  });

  it('inside without a prepreg beside it: the row above fills', () => {
    const rows = 'plane G1 18 um; core 0.3 mm er 4.4; copper S 20 um; core 0.2 mm er 4; plane G2 18 um';
    assert.deepEqual(shown(sectionOf(rows, pairOn('S'))).layers, [[4, 200], [4.4, 320]]);
  });

  it('lays the wide face on the adjacent core, else towards the board’s middle', () => {
    const cut = (name: string, stackup: string) => shown(sectionOf(stackup, pairOn(name))).conductors[0];
    const undercut = inner.replaceAll('17 um', '17 um undercut 5 um');
    // S1 hangs from the core above it: its narrow face is below.
    assert.deepEqual(cut('S1', undercut), ['signal', 0, 517, 190, 17, -5]);
    assert.deepEqual(cut('S2', undercut), ['signal', 0, 300, 200, 17, 5]);
    const noCore = 'plane G1 18 um; prepreg 0.4 mm er 4; copper S 20 um undercut 5 um; prepreg 0.2 mm er 4; plane G2 18 um';
    assert.deepEqual(cut('S', noCore), ['signal', 0, 200, 190, 20, -5]);
    const outer = fourLayers.replaceAll('35 um', '35 um undercut 8 um');
    assert.deepEqual(cut('TOP', outer), ['signal', 0, 200, 200, 35, 8]);
    assert.deepEqual(cut('BOTTOM', outer), ['signal', 0, 200, 200, 35, 8]);
  });

  it('keeps the gap between the wide faces, so that narrow faces are further apart', () => {
    const undercut = inner.replace('S1   17 um', 'S1   17 um undercut 5 um');
    const [a, b] = sectionOf(undercut, pairOn('S1')).conductors;
    assert.ok(Math.abs(b.x - a.x - a.width - 0.31e-3) < 1e-12);
  });

  it('counts a signal layer that the run does not use as fill', () => {
    const rows = 'copper TOP 35 um; prepreg 0.2 mm er 4; copper S 20 um; prepreg 0.3 mm er 4; plane G 18 um';
    assert.deepEqual(shown(sectionOf(rows, pairOn('TOP'))).layers, [[4, 520], [1, Infinity]]);
    // Unused outer copper: the mask lies on the laminate.
    const masked = shown(sectionOf(`mask 25 um er 3.4\n${rows}`, pairOn('S')));
    assert.deepEqual([masked.layers, masked.film], [[[4, 520], [3.4, 25], [1, Infinity]], undefined]);
    assert.deepEqual(shown(sectionOf(`mask 25 um er 3.4 flat\n${rows}`, pairOn('S'))).layers, [[4, 520], [3.4, 60], [1, Infinity]]);
  });

  it('refers to the nearest planes, those cut away aside', () => {
    const without = shown(sectionOf(fourLayers, `run r on TOP for 10 mm { trace A 0.2 mm; gap 0.3 mm; trace B 0.15 mm; without GND1 }`));
    // Where GND1 was, its prepreg fills.
    assert.deepEqual(without.layers, [[4.4, 1100], [4.2, 218], [1, Infinity]]);
    assert.equal(without.conductors[0][2], 1318);
  });

  it('of rows on two layers: the lower row shifted, each on its own layer', () => {
    const rows = 'plane G1 18 um; prepreg 0.2 mm er 4.2; copper S1 35 um; prepreg 0.2 mm er 4.2; copper S2 35 um; prepreg 0.2 mm er 4.2; plane G2 18 um';
    const run = 'run r for 10 mm { on S1 { trace A 0.2 mm }; on S2 { shift -0.1 mm; trace B 0.2 mm } }';
    assert.deepEqual(shown(sectionOf(rows, run)), {
      below: 'plane', layers: [[4.2, 670]], above: 'plane',
      conductors: [['signal', 100, 435, 200, 35, 0], ['signal', 0, 200, 200, 35, 0]],
    });
  });

  it('parted by a plane is two sections, and one where the plane is cut away', () => {
    const rows = '{ on TOP { trace A 0.2 mm }; on BOTTOM { trace B 0.2 mm }';
    assert.equal(sectionsOf(fourLayers, `run r for 10 mm ${rows} }`).length, 2);
    const [only] = sectionsOf(fourLayers, `run r for 10 mm ${rows}; without GND1; without PWR }`);
    assert.deepEqual([only.planeBelow, only.planeAbove, only.conductors.length], [false, false, 2]);
  });

  it('with films on both faces in one section keeps one, and says that the other counts as planar', () => {
    const rows = 'mask 20 um er 3.5; copper TOP 35 um; core 0.5 mm er 4.4; copper BOTTOM 35 um; mask 20 um er 3.5';
    const project = projectOf(`stackup { ${rows} }\nnet A { swing 1 V; rise 1 ns }\nnet B { tolerates 1 V peak }\nrun r for 10 mm { on TOP { trace A 0.2 mm; gap 0.3 mm; return GND 1 mm }; on BOTTOM { trace B 0.2 mm } }`);
    const [{ section, undersidePlanar }] = runSections(project.runs[0]);
    assert.equal(undersidePlanar, true);
    assert.deepEqual(shown(section).layers, [[1, Infinity], [3.5, 55], [4.4, 500], [1, Infinity]]);
    assert.deepEqual(shown(section).film, ['above', 3.5, 20]);
    assert.deepEqual(shown(section).conductors.map(([, , y]) => y), [555, 555, 20]);
  });

  it('without planes has air on both sides, and a return or a guard for reference', () => {
    const rows = 'copper TOP 35 um; core 1.5 mm er 4.7';
    assert.deepEqual(shown(sectionOf(rows, 'run r on TOP for 10 mm { trace A 0.4 mm; gap 1 mm; trace B 0.4 mm; gap 1 mm; return GND 2 mm }')), {
      below: 'open', layers: [[1, Infinity], [4.7, 1500], [1, Infinity]], above: 'open',
      conductors: [['signal', 0, 1500, 400, 35, 0], ['signal', 1400, 1500, 400, 35, 0], ['reference', 2800, 1500, 2000, 35, 0]],
    });
    const underside = 'core 1.5 mm er 4.7; copper TOP 35 um';
    const run = 'run r on TOP for 10 mm { trace A 0.4 mm; gap 1 mm; trace B 0.4 mm; gap 1 mm; return GND 2 mm }';
    assert.equal(sectionKey(sectionOf(rows, run)), sectionKey(sectionOf(underside, run)));
  });
});
