/**
 * Names that were read and looked up by no one, such as those of a property that is stated twice: they mean the same thing as the
 * others, and follow them.
 */
import type { NameSet, Place, Project } from '../../board/model';
import { shapeOf } from '../../syntax/fits';
import type { BlockKind, Part } from '../../syntax/grammar';
import type { Statement } from '../../syntax/tree';
import { setsOf } from '../nameSets';
import type { Session } from '../session';

export function passedOverPlaces(session: Session, project: Project, { set, names }: { readonly set: NameSet; readonly names: readonly string[] }): readonly Place[] {
  const wanted = new Set(names);
  const places: Place[] = [];
  const visit = (path: string, kind: BlockKind, statements: readonly Statement[]) => {
    for (const { keyword, values, block } of statements) {
      // What a waiver stands on is found by name alone, wherever that is declared: all of those were looked up.
      for (const value of keyword === 'waive' ? [] : values) {
        if (value.kind !== 'name' || !(value.range ?? [value.name]).some((name) => wanted.has(name))) continue;
        const part = nameParts(shapeOf(kind, keyword)?.parts ?? []).find(({ role }) => role === value.role);
        if (part !== undefined && meant(project, part, value.name) === set) places.push({ path, span: { start: value.span.start, end: value.span.end } });
      }
      if (block !== null) visit(path, block.kind, block.statements);
    }
  };
  for (const path of project.files) visit(path, 'file', session.tree(path)?.statements ?? []);
  return places;
}

type NamePart = Part & { readonly is: 'name' };

/** A guard that has a net's name is that net's. */
function meant(project: Project, { of }: NamePart, name: string): NameSet {
  return of === 'free' && project.names.get('signal')?.has(name) === true ? 'signal' : setsOf[of][0]!;
}

function nameParts(parts: readonly Part[]): readonly NamePart[] {
  return parts.flatMap((part): readonly NamePart[] => {
    switch (part.is) {
      case 'name': return [part];
      case 'optional':
      case 'repeat': return nameParts(part.parts);
      case 'choice':
      case 'suffixes': return part.of.flatMap(nameParts);
      default: return [];
    }
  });
}
