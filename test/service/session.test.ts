/** Texts in, projects out: which files are roots, what is wanted, and that an edit costs what it changed. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { Session } from '../../server/src/service/session';

function sessionOf(files: Readonly<Record<string, string>>): Session {
  const session = new Session();
  for (const [path, text] of Object.entries(files)) session.setText(path, text);
  return session;
}

const layers = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = (gap: string) => `use "layers.quiet"
net A { swing 3.3 V; rise 2 ns; source 33 ohm; load 1 Mohm, 5 pF }
net B { source 100 ohm; load 1 kohm; tolerates 1 uV peak }
run one on TOP for 20 mm { trace A 0.2 mm; gap ${gap} mm; trace B 0.2 mm }
run two on TOP for 20 mm { trace A 0.2 mm; gap 0.6 mm; trace B 0.3 mm }
`;

describe('roots', () => {
  it('are the files that no other uses', () => {
    const session = sessionOf({ 'b.quiet': 'use "c/d.quiet"\n', 'a.quiet': 'use "c/d.quiet"\n', 'c/d.quiet': 'use "../e.quiet"\n', 'e.quiet': '' });
    assert.deepEqual(session.roots(), ['a.quiet', 'b.quiet']);
    assert.deepEqual(session.projectsOf('e.quiet'), ['a.quiet', 'b.quiet']);
    assert.deepEqual(session.projectsOf('a.quiet'), ['a.quiet']);
  });

  it('change with the texts', () => {
    const session = sessionOf({ 'a.quiet': 'use "b.quiet"\n', 'b.quiet': '' });
    assert.deepEqual(session.roots(), ['a.quiet']);
    session.setText('a.quiet', '');
    assert.deepEqual(session.roots(), ['a.quiet', 'b.quiet']);
    session.forget('b.quiet');
    assert.deepEqual(session.roots(), ['a.quiet']);
  });

  it('of a circle are one, which has a finding', () => {
    const session = sessionOf({ 'a.quiet': 'use "b.quiet"\n', 'b.quiet': 'use "a.quiet"\n', 'c.quiet': 'use "c.quiet"\n' });
    assert.deepEqual(session.roots(), ['a.quiet', 'c.quiet']);
    assert.deepEqual(session.findings('b.quiet').map(({ rule }) => rule), ['include']);
    assert.deepEqual(session.findings('c.quiet').map(({ rule }) => rule), ['include']);
  });
});

describe('files that are missing', () => {
  it('are those that are used and of which nothing is known', () => {
    const session = sessionOf({ 'a.quiet': 'use "b.quiet"\nnet A is f\n' });
    assert.deepEqual(session.missing(), ['b.quiet']);
    assert.deepEqual(session.project('a.quiet').errors, []);
    session.setText('b.quiet', 'use "c.quiet"\nfamily f { swing 1 V }\n');
    assert.deepEqual(session.missing(), ['c.quiet']);
    session.setProblem('c.quiet', { problem: 'missing' });
    assert.deepEqual(session.missing(), []);
    assert.deepEqual(session.findings('b.quiet').map(({ message }) => message), ['there is no file "c.quiet"']);
    session.forget('c.quiet');
    assert.deepEqual(session.missing(), ['c.quiet']);
  });

  it('are not asked for again when they could not be read', () => {
    const session = sessionOf({ 'a.quiet': 'use "b.quiet"\n' });
    session.setProblem('b.quiet', { problem: 'unread' });
    assert.deepEqual(session.missing(), []);
  });
});

describe('an analysis', () => {
  it('stays until a text that it rests on changes', () => {
    const session = sessionOf({ 'a.quiet': board('0.4'), 'layers.quiet': layers, 'other.quiet': 'net X { swing 1 V }\n' });
    const first = session.analyse('a.quiet');
    assert.equal(session.analyse('a.quiet'), first);
    session.setText('other.quiet', 'net X { swing 2 V }\n');
    session.setText('a.quiet', board('0.4'));
    assert.equal(session.analyse('a.quiet'), first);
    session.setText('layers.quiet', `${layers}# a comment\n`);
    assert.notEqual(session.analyse('a.quiet'), first);
  });

  it('solves again only what an edit changed', () => {
    const session = sessionOf({ 'a.quiet': board('0.4'), 'layers.quiet': layers });
    assert.equal(session.analyse('a.quiet').evaluation.work.sectionsSolved, 2);
    session.setText('a.quiet', board('0.5'));
    assert.equal(session.analyse('a.quiet').evaluation.work.sectionsSolved, 1);
    session.setText('a.quiet', board('0.4'));
    assert.equal(session.analyse('a.quiet').evaluation.work.sectionsSolved, 0);
  });

  it('of an edit that is only tried leaves the text alone', () => {
    const session = sessionOf({ 'a.quiet': board('0.4'), 'layers.quiet': layers });
    const before = session.analyse('a.quiet').evaluation.budgets[0].total!;
    const start = board('0.4').indexOf('0.4 mm');
    const { budgets } = session.evaluateWith('a.quiet', [{ path: 'a.quiet', span: { start, end: start + 6 }, newText: '2 mm' }]);
    assert.ok(budgets[0].total! < before);
    assert.equal(session.analyse('a.quiet').evaluation.budgets[0].total, before);
    assert.equal(session.text('a.quiet'), board('0.4'));
  });
});

describe('findings of a file', () => {
  it('are those of all its projects, equal ones once', () => {
    const session = sessionOf({ 'a.quiet': 'use "f.quiet"\nnet N { swing 1 V }\n', 'b.quiet': 'use "f.quiet"\n', 'f.quiet': 'net M is g { swing 0 }\nlink l { between N and M; mutual 1 nH }\n' });
    const found = session.findings('f.quiet').map(({ rule, message }) => `${rule}: ${message}`);
    assert.equal(found.filter((finding) => finding.startsWith('unit')).length, 1);
    session.setText('f.quiet', 'link l { between N and N2; mutual 1 nH }\nnet N2 { swing 1 V }\n');
    assert.deepEqual(session.findings('f.quiet').map(({ message }) => message).filter((message) => message.startsWith('no net')), ['no net N; N2?']);
  });
});
