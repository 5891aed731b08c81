/** Declares a net that a run or another statement names and nothing declares, above what names it. */
import type { Finding } from '../rules/rule';
import { unknownName } from '../rules/unknownName';
import { statementShapes } from '../syntax/statements';
import { parse } from '../syntax/parse';
import type { BlockKind, Part } from '../syntax/grammar';
import type { Statement } from '../syntax/tree';
import { writtenName } from '../syntax/writtenName';
import type { Fix, FixContext } from './fix';

export function declaredNet({ rule, at }: Finding, context: FixContext): readonly Fix[] {
  if (rule !== unknownName.name) return [];
  const text = context.text(at.path);
  const missing = missingNet(parse(text).statements, 'file', at.span.start);
  if (missing === null) return [];
  const lineStart = text.lastIndexOf('\n', missing.declaration.span.start - 1) + 1;
  const newline = text.includes('\r\n') ? '\r\n' : '\n';
  const edits = [{ path: at.path, span: { start: lineStart, end: lineStart }, newText: `net ${writtenName(missing.name)} { }${newline}` }];
  const errors = context.evaluateWith(edits).project.errors.length;
  return errors < context.project.errors.length ? [{ title: `Declare net ${missing.name}`, rule, at, edits, preferred: false }] : [];
}

interface MissingNet {
  readonly name: string;
  /** The declaration at top level in which it is named. */
  readonly declaration: Statement;
}

function missingNet(statements: readonly Statement[], kind: BlockKind, offset: number): MissingNet | null {
  for (const statement of statements) {
    if (offset < statement.span.start || statement.span.end <= offset) continue;
    const shape = statementShapes[kind].find(({ keyword }) => keyword === statement.keyword);
    const name = statement.values.find((value) => value.kind === 'name' && value.range === null && value.span.start <= offset && offset < value.span.end);
    if (name?.kind === 'name' && shape !== undefined && namesNet(shape.parts, name.role)) return { name: name.name, declaration: statement };
    const inner = statement.block === null ? null : missingNet(statement.block.statements, statement.block.kind, offset);
    return inner === null ? null : { ...inner, declaration: statement };
  }
  return null;
}

/** The grammar says that a net is due where the value with this role stands. */
function namesNet(parts: readonly Part[], role: string): boolean {
  return parts.some((part) => {
    switch (part.is) {
      case 'name': return part.role === role && part.of === 'net' && !part.declares;
      case 'optional': case 'repeat': return namesNet(part.parts, role);
      case 'choice': case 'suffixes': return part.of.some((option) => namesNet(option, role));
      default: return false;
    }
  });
}
