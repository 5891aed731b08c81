/** The language reference: its examples are read, they show every statement, and its table is what the parser reads. `UPDATE=1` writes the table. */
import assert from 'node:assert/strict';
import { readFileSync, writeFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { builtInFamilies } from '../../server/src/board/builtInFamilies';
import { sourceLimits } from '../../server/src/board/sources';
import { usage } from '../../server/src/cli/arguments';
import { rules } from '../../server/src/rules/index';
import { fixedWords } from '../../server/src/syntax/fits';
import { formOf } from '../../server/src/syntax/forms';
import type { BlockKind, StatementShape } from '../../server/src/syntax/grammar';
import { parse } from '../../server/src/syntax/parse';
import { statementShapes } from '../../server/src/syntax/statements';
import type { Statement } from '../../server/src/syntax/tree';
import type { Dimension } from '../../server/src/units/dimension';
import { fittingUnits } from '../../server/src/units/spelling';

const page = 'syntaxes/language.md';
const glance = '## Every statement at a glance\n\nMade from the table that the parser reads. Capitals stand for a value, `[ ]` for what may be left out, `|` for alternatives.\n\n';
const text = readFileSync(page, 'utf8');
const examples = [...text.matchAll(/^```quietrun\n([\s\S]*?)^```$/gm)].map((match) => match[1]!);

describe('the language reference', () => {
  for (const example of examples) it(`reads ${example.split('\n')[0]}`, () => assert.deepEqual(parse(example).errors, []));

  it('shows every statement of every block', () => {
    const shown = new Set(examples.flatMap((example) => everyStatement(parse(example).statements, 'file')));
    const all = Object.entries(statementShapes).flatMap(([kind, shapes]) => shapes.map(({ keyword }) => `${kind} ${keyword}`));
    // What a pair shares with a net and a run with its rows is shown there, and a waiver within a declaration once.
    const elsewhere = all.filter((each) => (each.startsWith('pair ') && shown.has(each.replace('pair', 'net'))) || (each.startsWith('row ') && shown.has(each.replace('row', 'run'))) || (each.startsWith('run ') && shown.has(each.replace('run', 'row'))) || each.endsWith(' waive'));
    assert.deepEqual(all.filter((each) => !shown.has(each) && !elsewhere.includes(each)), []);
  });

  it('uses every word of the language', () => {
    const words = new Set(text.split(/[^a-z-]+/));
    assert.deepEqual([...fixedWords].filter((word) => !words.has(word)), []);
  });

  it('names every unit, rule about the text, built-in family, limit and command', () => {
    for (const dimension of ['length', 'area', 'time', 'frequency', 'voltage', 'current', 'resistance', 'capacitance', 'inductance', 'temperature', 'level', 'fraction', 'angle'] satisfies Dimension[]) {
      assert.ok(text.includes(`\`${fittingUnits(dimension).join(' ')}`) || fittingUnits(dimension).every((unit) => text.includes(`\`${unit}\``)), dimension);
    }
    for (const { name, standard } of builtInFamilies) assert.ok(text.includes(`\`${name}\``) && text.includes(standard.replace('TTL dc levels', 'ttl')), name);
    for (const { name } of rules) if (['syntax', 'unit', 'missing-value', 'bad-value', 'unknown-name', 'duplicate-name', 'include'].includes(name)) assert.ok(text.includes(`| \`${name}\` |`), name);
    assert.ok(text.includes(`at most ${sourceLimits.files} files, ${sourceLimits.depth}\ndeep`));
    for (const line of usage.split('\n').slice(0, 4)) assert.ok(text.includes(line), line);
  });

  it('ends with the table of statements', () => {
    const expected = `${text.slice(0, text.indexOf(glance))}${glance}${table()}`;
    if (process.env.UPDATE === '1') writeFileSync(page, expected);
    assert.equal(process.env.UPDATE === '1' ? expected : text, expected);
  });
});

function table(): string {
  const titles: Readonly<Record<BlockKind, string>> = {
    file: 'at top level', board: 'in a board', stackup: 'in a stackup', net: 'in a net, a family or a pair', pair: 'in a pair, besides', run: 'in a run', row: 'in a layer of a run, besides',
    loop: 'in a loop', return: 'in a return', link: 'in a link', shield: 'in a shield', ambient: 'in an ambient',
  };
  const sections = (Object.keys(titles) as BlockKind[]).map((kind) => {
    const shared = kind === 'pair' ? statementShapes.net : kind === 'row' ? statementShapes.run : [];
    const own = statementShapes[kind].filter((shape) => !shared.includes(shape));
    return `**${titles[kind][0]!.toUpperCase()}${titles[kind].slice(1)}**\n\n${own.map(row).join('\n')}\n`;
  });
  return sections.join('\n');
}

function row(shape: StatementShape): string {
  return `- \`${formOf(shape)}\`: ${shape.about}`;
}

function everyStatement(statements: readonly Statement[], kind: BlockKind): readonly string[] {
  return statements.flatMap(({ keyword, block }) => [`${kind} ${keyword}`, ...(block === null ? [] : everyStatement(block.statements, block.kind))]);
}
