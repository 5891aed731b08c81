import type { SourceTree, Statement, Value } from '../../server/src/syntax/tree';

/** A tree as the text cases show it: statements with their values by role, then what is wrong, with the text that is marked. */
export function treeText(tree: SourceTree): string {
  const lines = [
    ...(tree.version === null ? [] : [`version ${tree.version.value}`]),
    ...tree.statements.flatMap((statement) => statementLines(statement, '')),
    ...tree.unread.map((span) => `~ ${shown(tree.text.slice(span.start, span.end))}`),
    ...tree.errors.map(({ rule, span, message, corrections }) => `! ${rule} |${shown(tree.text.slice(span.start, span.end))}| ${message}${corrections.length === 0 ? '' : ` [${corrections.map(({ title }) => title).join('; ')}]`}`),
  ];
  return lines.join('\n');
}

function statementLines(statement: Statement, indent: string): string[] {
  const { keyword, values, block, documentation, broken } = statement;
  const head = [keyword, ...values.map(valueText), ...(documentation === null ? [] : [`documented ${JSON.stringify(documentation)}`]), ...(broken ? ['BROKEN'] : [])].join(' ');
  if (block === null) return [indent + head];
  return [`${indent}${head} {`, ...block.statements.flatMap((each) => statementLines(each, `${indent}  `)), `${indent}}${block.closed ? '' : ' UNCLOSED'}`];
}

function valueText(value: Value): string {
  switch (value.kind) {
    case 'name': return `${value.role}=${value.range === null ? JSON.stringify(value.name) : `[${value.range.length <= 4 ? value.range.join(' ') : `${value.range[0]} ${value.range[1]} … ${value.range.at(-1)}`}]`}`;
    case 'quantity': return `${value.role}=${value.value}${value.tolerance === null ? '' : `±${value.tolerance}`}:${value.dimension}`;
    case 'word': return `${value.role}=${value.word}`;
    case 'string': return `${value.role}=${JSON.stringify(value.text)}`;
    case 'point': return `${value.role}=(${[value.x, value.y, value.z].flatMap((each) => (each === null ? [] : [each.value])).join(' ')})`;
  }
}

function shown(text: string): string {
  return text.length <= 60 ? text.replaceAll('\n', '⏎') : `${text.slice(0, 57).replaceAll('\n', '⏎')}…`;
}
