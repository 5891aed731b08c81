import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { filmOutline, type FilmedConductor } from '../../../../server/src/physics/section/film/outline';
import { outlinePanels, type PanelSetting } from '../../../../server/src/physics/section/film/outlinePanels';
import { near } from '../../../support/near';

const copper = (left: number, right: number, height: number): FilmedConductor => ({ left, right, top: 200 + height });
const corners = (conductors: readonly FilmedConductor[], thickness = 25) => filmOutline(conductors, 200, thickness).map(({ x, y }) => `${x},${y}`);

describe('filmOutline', () => {
  it('is that of the reference case: boxes 25 um around each trace on a flat film (A-MSM-g0.4)', () => {
    assert.deepEqual(corners([copper(-400, -200, 35), copper(200, 400, 35)]), [
      '-425,225', '-425,260', '-175,260', '-175,225', '175,225', '175,260', '425,260', '425,225',
    ]);
  });

  it('fills a gap of at most twice the thickness, and what is hardly more', () => {
    const filled = ['-25,225', '-25,260', '275,260', '275,225'];
    for (const gap of [20, 50, 50.4]) assert.deepEqual(corners([copper(0, 100, 35), copper(100 + gap, 250, 35)]), filled, `gap ${gap}`);
    assert.equal(corners([copper(0, 100, 35), copper(152, 250, 35)]).length, 8);
  });

  it('steps where roofs differ, at the edge of the higher one', () => {
    assert.deepEqual(corners([copper(0, 100, 35), copper(130, 250, 15)]), ['-25,225', '-25,260', '125,260', '125,240', '275,240', '275,225']);
    assert.deepEqual(corners([copper(0, 100, 15), copper(130, 250, 35)]), ['-25,225', '-25,240', '105,240', '105,260', '275,260', '275,225']);
  });

  it('does not depend on the order of the conductors, and is flat over copper of no height', () => {
    const three = [copper(0, 100, 35), copper(130, 250, 15), copper(600, 700, 20)];
    assert.deepEqual(corners([three[2], three[0], three[1]]), corners(three));
    assert.deepEqual(corners([copper(0, 100, 0)]), []);
    assert.deepEqual(corners([]), []);
  });
});

describe('outlinePanels', () => {
  const setting: PanelSetting = { first: 75, firstOverNearest: 1.5, ratio: 4, longest: 600, longestOverEdges: 75, edges: [0, 100, 130, 250], reach: 10_000, cornerOrder: 3, middleOrder: 4, edge: -0.2, layer: 1 };
  const outline = filmOutline([copper(0, 100, 35), copper(130, 250, 15)], 200, 25);
  const panels = outlinePanels(outline, setting);

  it('cover the face from end to end without a gap, with the edge’s exponent at the corners only', () => {
    near(panels[0].x0, -25 - 10_000, 1e-15);
    near(panels[panels.length - 1].x1, 275 + 10_000, 1e-15);
    const isCorner = (x: number, y: number) => outline.some((corner) => Math.abs(corner.x - x) < 1e-9 && Math.abs(corner.y - y) < 1e-9);
    panels.forEach((panel, i) => {
      if (0 < i) {
        assert.ok(Math.abs(panel.x0 - panels[i - 1].x1) < 1e-9 && Math.abs(panel.y0 - panels[i - 1].y1) < 1e-9);
      }
      assert.equal(panel.basis.start, isCorner(panel.x0, panel.y0) ? -0.2 : 0);
      assert.equal(panel.basis.end, isCorner(panel.x1, panel.y1) ? -0.2 : 0);
      assert.equal(panel.order, panel.basis.start === 0 && panel.basis.end === 0 ? 4 : 3);
      near(panel.length, Math.hypot(panel.x1 - panel.x0, panel.y1 - panel.y0), 1e-12);
    });
  });

  it('shrink to corners, and stay short over the edges of conductors that share a roof', () => {
    const beside = panels.filter(({ basis }) => basis.start !== 0 || basis.end !== 0);
    for (const { length } of beside) assert.ok(length <= 2 * 75 + 1e-9);
    const wide = outlinePanels(filmOutline([copper(0, 400, 35), copper(430, 900, 35)], 200, 25), { ...setting, edges: [0, 400, 430, 900] });
    const roof = wide.filter(({ y0, y1 }) => y0 === 260 && y1 === 260);
    assert.ok(12 <= roof.length && roof.every(({ length }) => length <= 75 + 1e-9), `${roof.length} panels`);
  });
});
