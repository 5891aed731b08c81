/**
 * Where a name may stand that no one could make out: on lines with a mistake, as a word of its own. A rename must not go past it
 * without a word, since the line means that name once it is mended.
 */
import type { NameSet, Place, Project } from '../../board/model';
import { namesInRange } from '../../syntax/names';
import type { SourceTree, Span, Token } from '../../syntax/tree';
import type { Session } from '../session';

export function unreadablePlaces(session: Session, project: Project, { set, names }: { readonly set: NameSet; readonly names: readonly string[] }): readonly Place[] {
  const records = names.map((name) => project.names.get(set)?.get(name));
  if (!records.some((record) => record?.inUnreadable === true)) return [];
  const others = new Set([...project.names].flatMap(([other, of]) => (other === set ? [] : names.flatMap((name) => of.get(name) ?? []).flatMap(({ declarations, uses, waivers }) => [...declarations, ...uses, ...waivers]))).map(keyOf));
  return project.files.flatMap((path) => {
    const tree = session.tree(path);
    const tokens = tree === undefined ? [] : tokensOnBrokenLines(tree).filter((token) => isOneOf(tree.text.slice(token.start, token.end), token, names));
    return tokens.map(({ start, end }) => ({ path, span: { start, end } })).filter((place) => !others.has(keyOf(place)));
  });
}

function tokensOnBrokenLines({ tokens, errors, unread }: SourceTree): readonly Token[] {
  const stretches: readonly Span[] = [...errors.map(({ span }) => span), ...unread];
  const broken: Token[] = [];
  let line: Token[] = [];
  const close = () => {
    const [from, to] = [line[0]?.start ?? 0, line.at(-1)?.end ?? 0];
    if (0 < line.length && stretches.some(({ start, end }) => start <= to && from <= end)) broken.push(...line);
    line = [];
  };
  for (const token of tokens) {
    if (token.kind === 'newline') close();
    else line.push(token);
  }
  close();
  return broken;
}

function isOneOf(written: string, { kind }: Token, names: readonly string[]): boolean {
  if (kind === 'string') return names.includes(written.replace(/^"|"$/g, '').replaceAll('""', '"'));
  if (kind !== 'word') return false;
  const range = written.includes('..') ? namesInRange(written) : '';
  return typeof range === 'string' ? names.includes(written) : range.some((name) => names.includes(name));
}

const keyOf = ({ path, span }: Place) => `${span.start} ${span.end} ${path}`;
