/** The pictures of a hover: there for those who show them, with the numbers of the evaluation, and never so large that an editor cuts them off. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { escaped } from '../../server/src/service/hover/markdown';
import { longestHover, withinSize } from '../../server/src/service/hover/pictureInMarkdown';
import { hover, hoverWithPictures } from '../../server/src/service/hover';
import { Session } from '../../server/src/service/session';
import { inText } from '../../server/src/units/inText';
import { readXml } from '../support/wellFormedXml';

const stack = 'stackup main { mask 20 um er 3.5; copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const ends = 'source 50 ohm; load 50 ohm';

function sessionOf(text: string): Session {
  const session = new Session();
  session.setText('b.quiet', text);
  return session;
}

function pictured(session: Session, at: string, until = Infinity): string {
  const text = session.text('b.quiet')!;
  assert.ok(text.includes(at), at);
  return hoverWithPictures(session, 'b.quiet', { offset: text.indexOf(at) + at.length - 1, pictures: { until } })!.markdown;
}

const image = /!\[((?:\\.|[^\]\\])*)\]\(data:image\/svg\+xml;base64,([A-Za-z0-9+/=]*)\)/g;

/** Of each picture its words, and what the drawing says. */
function picturesIn(markdown: string): readonly { readonly words: string; readonly texts: readonly string[]; readonly svg: string }[] {
  return [...markdown.matchAll(image)].map(([, words, data]) => {
    const svg = Buffer.from(data!, 'base64').toString('utf8');
    return { words: words!.replace(/\\(.)/g, '$1'), svg, texts: readXml(svg).children.filter(({ name }) => name === 'text').map(({ text }) => text) };
  });
}

const board = `${stack}net CLK { swing 3.3 V; rise 1 ns; ${ends} }\nnet RX { ${ends}; tolerates 20 mV peak }\nrun past on TOP for 38 mm { trace CLK 0.25 mm; gap 0.3 mm; guard AGND 0.2 mm stitched 2 mm; gap 0.2 mm; trace RX 0.15 mm }\n`;

describe('pictures in hovers', () => {
  it('are for those who show them', () => {
    const session = sessionOf(board);
    assert.ok(!hover(session, 'b.quiet', board.indexOf('net RX') + 5)!.markdown.includes('data:'));
    assert.ok(pictured(session, 'net RX').includes('data:image/svg+xml;base64,'));
  });

  it('say of a net what its budget says, above the table and below the number', () => {
    const session = sessionOf(board);
    const markdown = pictured(session, 'net RX');
    const budget = session.analyse('b.quiet').evaluation.budgets[0]!;
    const [bars] = picturesIn(markdown);
    assert.ok(bars!.words.includes(`${inText(budget.total!, 'voltage')}`) && bars!.words.includes(`${inText(budget.tolerates, 'voltage')} tolerated`), bars!.words);
    for (const { value } of budget.contributions) assert.ok(bars!.texts.some((text) => text.startsWith(inText(value, 'voltage'))) && bars!.words.includes(inText(value, 'voltage')), inText(value, 'voltage'));
    assert.ok(markdown.indexOf('tolerated:') < markdown.indexOf('![') && markdown.indexOf('![') < markdown.indexOf('| channel'));
  });

  it('draw of a run its copper, its planes and its mask', () => {
    const session = sessionOf(board);
    for (const at of ['run past', 'guard AGND']) {
      const section = picturesIn(pictured(session, at)).find(({ words }) => words.startsWith('Cross-section'));
      assert.ok(section, at);
      for (const said of ['CLK 0.25 mm wide', 'gap 0.3 mm', 'guard AGND 0.2 mm wide, tied every 2 mm', '0.2 mm of εr 4.2', 'plane GND', 'mask of 20 µm']) assert.ok(section.words.includes(said), `${said} is not in ${section.words}`);
    }
  });

  it('draw of a trace the noise over time, with the peaks of the evaluation', () => {
    const session = sessionOf(board);
    const coupling = session.analyse('b.quiet').evaluation.runs[0]!.couplings[0]!;
    const drawing = picturesIn(pictured(session, 'trace RX')).find(({ words }) => words.startsWith('What CLK puts on RX over time'));
    assert.ok(drawing);
    for (const [where, value] of [['receiver', coupling.atReceiver], ['near end', coupling.nearEnd], ['far end', coupling.farEnd]] as const) {
      assert.ok(drawing.words.includes(`peak of ${inText(value, 'voltage')} at the ${where}`), `${where} ${value}: ${drawing.words}`);
      assert.ok(drawing.texts.includes(`${where} ${inText(value, 'voltage')}`), drawing.texts.join(', '));
    }
  });

  it('draw of a gap the noise at others as the board with those has it', () => {
    const session = sessionOf(board);
    const drawing = picturesIn(pictured(session, 'gap 0.3'))[0];
    assert.ok(drawing?.words.startsWith('Noise on RX against this gap'), drawing?.words);
    const said = [...drawing.words.matchAll(/([\d.]+ [mµ]?V) at ([\d.]+) (µm|mm)(?! now)/g)].map(([, noise, gap, unit]) => ({ noise, gap: unit === 'mm' ? Number(gap) : Number(gap) / 1000 }));
    assert.ok(4 < said.length, drawing.words);
    for (const { noise, gap } of said.slice(-2)) {
      const total = sessionOf(board.replace('gap 0.3 mm', `gap ${gap} mm`)).analyse('b.quiet').evaluation.budgets[0]!.total!;
      const [number, prefix] = noise!.split(' ');
      // The gap is read from three figures.
      assert.ok(Math.abs(Number(number) * (prefix === 'mV' ? 1e-3 : prefix === 'µV' ? 1e-6 : 1) / total - 1) < 0.01, `${noise} at ${gap} mm, ${total}`);
    }
  });

  it('leave the noise against the gap for later where it takes too long, and have it then', () => {
    const session = sessionOf(board);
    session.analyse('b.quiet');
    const steps: (() => boolean)[] = [];
    const offset = board.indexOf('gap 0.3') + 6;
    const pictures = { until: 0, later: (step: () => boolean) => steps.push(step) };
    assert.ok(!hoverWithPictures(session, 'b.quiet', { offset, pictures })!.markdown.includes('data:'));
    assert.equal(steps.length, 1);
    let count = 1;
    while (steps[0]!()) count += 1;
    assert.ok(8 < count && count < 20, String(count));
    assert.ok(hoverWithPictures(session, 'b.quiet', { offset, pictures })!.markdown.includes('data:'));
  });

  it('draw of a loop its outline', () => {
    const session = sessionOf(`${stack}loop out on TOP { rectangle 22 mm by 9 mm; strip 1 mm; area at most 120 mm2; over GND }\nloop ring on TOP { circle 10 mm; wire 0.3 mm }\n`);
    const [drawing] = picturesIn(pictured(session, 'loop out'));
    const result = session.analyse('b.quiet').evaluation.loops[0]!;
    for (const said of ['22 mm by 9 mm', `${inText(result.area!, 'area')} of 120 mm² at most`, inText(result.inductance!, 'inductance'), 'over plane GND']) assert.ok(drawing!.words.includes(said), `${said}: ${drawing!.words}`);
    assert.match(picturesIn(pictured(session, 'loop ring'))[0]!.words, /10 mm by 10 mm; 78\.5 mm²/);
  });

  it('draw what lies on the underside of a board the right way up', () => {
    const below = 'stackup two { plane GND 18 um; core 0.4 mm er 4.2; copper BOTTOM 35 um }\n';
    const session = sessionOf(`${below}net A { ${ends} }\nrun r on BOTTOM for 9 mm { trace A 0.2 mm }\n`);
    const [section] = picturesIn(pictured(session, 'run r'));
    assert.match(section!.words, /From top to bottom: plane GND, 0\.4 mm of εr 4\.2, air\./);
  });

  it('keep names that mean something to XML or to Markdown as text', () => {
    const name = '</title><script>x]]>`*_![y](c)&lt;|\'';
    const session = sessionOf(board.replaceAll('CLK', `"${name}"`).replaceAll('RX', `"${name}2"`));
    for (const at of [`net "${name}2`, `trace "${name}2`, 'run past']) {
      const markdown = pictured(session, at);
      const pictures = picturesIn(markdown);
      assert.ok(pictures.some(({ words }) => words.includes(name)), at);
      assert.ok(pictures.every(({ svg }) => !svg.includes('<script')));
      assert.ok(!/!\[y\]|<script/.test(markdown.replace(image, '').replace(/\\./g, '')));
      assert.ok(markdown.includes(escaped(name)));
    }
  });

  it('stay within what an editor shows, for a run of sixteen and a net with sixty contributions', () => {
    const long = 'A_RATHER_LONG_NAME_OF_A_NET_';
    const sixteen = `${stack}net ${long}[0..15] { swing 3.3 V; rise 1 ns; ${ends}; tolerates 20 mV peak }\nrun bus on TOP for 38 mm { trace ${long}[0..15] 0.15 mm spaced 0.15 mm }\n`;
    const sixty = `${stack}net RX { ${ends}; tolerates 20 mV peak }\nnet A[0..59] { swing 3.3 V; rise 1 ns; ${ends} }\n${Array.from({ length: 60 }, (_, index) => `run r${index} on TOP for 5 mm { trace A${index} 0.2 mm; gap 0.${20 + index} mm; trace RX 0.2 mm }\n`).join('')}`;
    const [bus, many] = [sessionOf(sixteen), sessionOf(sixty)];
    for (const [session, at] of [[bus, 'run bus'], [bus, `trace ${long}[0..15`], [bus, `net ${long}[0..15`], [many, 'net RX']] as const) {
      const markdown = pictured(session, at);
      assert.ok(0 < picturesIn(markdown).length && markdown.length < longestHover, `${at}: ${markdown.length} characters, ${picturesIn(markdown).length} pictures`);
    }
  });

  it('become words where there is no room for them, the last first', () => {
    const one = (words: string) => `![${words}](data:image/svg+xml;base64,${'A'.repeat(400)})`;
    const text = `first\n\n${one('a \\[b\\]')}\n\n${one('c')}\n\nlast`;
    assert.equal(withinSize(text, 2000), text);
    assert.equal(withinSize(text, 600), `first\n\n${one('a \\[b\\]')}\n\n*c*\n\nlast`);
    assert.equal(withinSize(text, 10), 'first\n\n*a \\[b\\]*\n\n*c*\n\nlast');
  });

  it('are the same bytes for the same board', () => {
    for (const at of ['net RX', 'trace RX', 'run past']) assert.equal(pictured(sessionOf(board), at), pictured(sessionOf(board), at));
  });
});
