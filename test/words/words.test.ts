/**
 * Everything that the editor says about a board, on one page beside this file, to be read in one sitting: findings with their
 * fixes, hints with what they say in full, code lenses, who disturbs whom, and the hover of each thing that has one. `UPDATE=1` writes the page anew.
 */
import assert from 'node:assert/strict';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, it } from 'node:test';
import { starterBoard } from '../../client/src/starterBoard';
import { disturbedBy, disturbs } from '../../server/src/service/disturbances';
import { partiesAt } from '../../server/src/service/disturbances/partiesAt';
import { fixesAt } from '../../server/src/service/fixesAt';
import { hintsOf } from '../../server/src/service/hints';
import { hoverWithPictures } from '../../server/src/service/hover';
import { lenses } from '../../server/src/service/lenses';
import { Session } from '../../server/src/service/session';

const boards: Record<string, { readonly root: string; readonly texts: Record<string, string> }> = {
  'first-board': { root: 'first.quiet', texts: { 'first.quiet': starterBoard } },
  'listening-post': example('buoy/listening-post.quiet', 'common/four-layer.quiet', 'common/parts.quiet'),
  'wave-gauge': example('buoy/wave-gauge.quiet', 'common/four-layer.quiet', 'common/parts.quiet'),
};

function example(root: string, ...used: readonly string[]) {
  return { root, texts: Object.fromEntries([root, ...used].map((file) => [file, readFileSync(path.join('examples', file), 'utf8')])) };
}

describe('what the editor says', () => {
  for (const [name, { root, texts }] of Object.entries(boards)) {
    it(`of ${root} is on its page`, () => {
      const session = new Session();
      for (const [file, text] of Object.entries(texts)) session.setText(file, text);
      for (const steps = session.carryTolerances(root); steps.next().done !== true;);
      assert.deepEqual(session.missing(), []);
      const page = pageOf(session, root);
      const expected = `test/words/${name}.md`;
      if (process.env['UPDATE'] === '1') writeFileSync(expected, page);
      assert.ok(existsSync(expected), `${expected} is missing: UPDATE=1 writes it`);
      assert.equal(page, readFileSync(expected, 'utf8'));
    });
  }
});

function pageOf(session: Session, root: string): string {
  const text = session.text(root)!;
  const sections = [`# What the editor says of ${path.basename(root)}`, '## Findings and their fixes'];
  for (const finding of session.findings(root)) {
    const titles = fixesAt(session, root, finding.at.span).filter(({ rule }) => rule === finding.rule).map(({ title, preferred }) => `- ${title}${preferred ? ' (preferred)' : ''}`);
    const related = finding.related.map(({ message }) => `  ${message}`);
    sections.push([`**${finding.severity} ${finding.rule}** at \`${quoted(text, finding.at.span)}\`: ${finding.message}${finding.waived === null ? '' : ` (waived: ${finding.waived})`}`, ...related, '', ...titles].join('\n').trimEnd());
  }
  sections.push('## Hints');
  for (const hint of [...hintsOf(session, root, { start: 0, end: text.length }, () => true)].filter((each) => each !== null).sort((a, b) => a.offset - b.offset)) {
    sections.push(`\`${lineAt(text, hint.offset)}\` shows \`${hint.parts.map((part) => part.text).join('')}\`\n\n${withoutPictures(hint.tooltip)}`);
  }
  sections.push('## Code lenses', lenses(session, root, () => true).map(({ place, title }) => `- over \`${lineAt(text, place.span.start)}\`: ${title}`).join('\n'));
  sections.push('## Who disturbs whom', disturbancesOf(session, root));
  sections.push('## Hovers');
  const said = new Set<string>();
  for (let offset = 0; offset < text.length; ) {
    const answer = hoverWithPictures(session, root, { offset, pictures: { until: Infinity } });
    const isNew = answer !== null && !said.has(answer.markdown);
    if (isNew) {
      said.add(answer.markdown);
      sections.push(`### \`${quoted(text, answer.span)}\` in \`${lineAt(text, offset)}\`\n\n${withoutPictures(answer.markdown)}`);
    }
    offset = answer === null ? offset + 1 : Math.max(offset + 1, answer.span.end + 1);
  }
  return `${sections.join('\n\n')}\n`;
}

/** The call hierarchy, one level deep, of every net and pair of the file. */
function disturbancesOf(session: Session, root: string): string {
  const { nets, pairs } = session.project(root);
  return [...nets.values(), ...pairs.values()].filter(({ place }) => place.path === root).flatMap(({ place }) => partiesAt(session, root, place.span.start)).map((party) => [
    `- ${party.kind} ${party.name}: ${party.detail}`,
    ...disturbedBy(session, party).map(({ party: { name }, detail }) => `  - disturbed by ${name}: ${detail}`),
    ...disturbs(session, party).map(({ party: { name }, detail }) => `  - disturbs ${name}: ${detail}`),
  ].join('\n')).filter((words, at, all) => all.indexOf(words) === at).join('\n');
}

const quoted = (text: string, { start, end }: { start: number; end: number }) => text.slice(start, end).replace(/\s+/g, ' ').slice(0, 60);

const lineAt = (text: string, offset: number) => text.slice(text.lastIndexOf('\n', offset - 1) + 1, (text.indexOf('\n', offset) + text.length + 1) % (text.length + 1)).trim();

/** The words that stand for a picture stay. */
const withoutPictures = (markdown: string) => markdown.replace(/\(data:image\/[^)]*\)/g, '(picture)');
