/**
 * Colours a text as an editor does: the part of the TextMate language that our grammar uses. Of all patterns
 * the one that matches first in the line wins, and of those that match at one place the first in the list.
 */
export interface Rule {
  readonly name?: string;
  readonly match?: string;
  readonly begin?: string;
  readonly end?: string;
  readonly include?: string;
  readonly captures?: Readonly<Record<string, { readonly name: string }>>;
  readonly patterns?: readonly Rule[];
}

export interface Grammar {
  readonly scopeName: string;
  readonly patterns: readonly Rule[];
  readonly repository: Readonly<Record<string, Rule>>;
}

/** A stretch and its innermost scope. */
export interface Coloured {
  readonly text: string;
  readonly scope: string;
}

export function colouredLine(grammar: Grammar, line: string): readonly Coloured[] {
  const rules = flattened(grammar, grammar.patterns);
  const coloured: Coloured[] = [];
  let at = 0;
  while (at < line.length) {
    const found = firstMatch(rules, line, at);
    if (found === null) break;
    const { rule, match } = found;
    const end = rule.begin === undefined ? match.index + match[0].length : endOf(rule, line, match.index + match[0].length);
    if (rule.captures !== undefined) for (const [index, { name }] of Object.entries(rule.captures)) if (match[Number(index)] !== undefined) coloured.push({ text: match[Number(index)]!, scope: name });
    if (rule.name !== undefined) coloured.push({ text: line.slice(match.index, end), scope: rule.name });
    at = Math.max(end, at + 1);
  }
  return coloured;
}

/** Every regular expression of the grammar, for checks of their cost. */
export function expressionsIn(rule: Rule | Grammar): readonly string[] {
  const { match, begin, end, patterns, repository } = rule as Rule & Partial<Grammar>;
  return [...[match, begin, end].filter((each) => each !== undefined), ...[...(patterns ?? []), ...Object.values(repository ?? {})].flatMap(expressionsIn)];
}

function flattened(grammar: Grammar, rules: readonly Rule[]): readonly Rule[] {
  return rules.flatMap((rule) => {
    if (rule.include !== undefined) return flattened(grammar, [grammar.repository[rule.include.slice(1)]!]);
    return rule.match === undefined && rule.begin === undefined ? flattened(grammar, rule.patterns ?? []) : [rule];
  });
}

function firstMatch(rules: readonly Rule[], line: string, at: number): { readonly rule: Rule; readonly match: RegExpExecArray } | null {
  let best: { readonly rule: Rule; readonly match: RegExpExecArray } | null = null;
  for (const rule of rules) {
    const expression = new RegExp((rule.match ?? rule.begin)!, 'g');
    expression.lastIndex = at;
    const match = expression.exec(line);
    if (match !== null && (best === null || match.index < best.match.index)) best = { rule, match };
  }
  return best;
}

/** Beyond the end of a begin/end rule: at each place the end is tried before the patterns within. */
function endOf(rule: Rule, line: string, from: number): number {
  for (let at = from; at <= line.length; ) {
    const end = new RegExp(rule.end!, 'y');
    end.lastIndex = at;
    const ended = end.exec(line);
    if (ended !== null) return at + ended[0].length;
    const inner = (rule.patterns ?? []).map((pattern) => {
      const expression = new RegExp(pattern.match!, 'y');
      expression.lastIndex = at;
      return expression.exec(line);
    }).find((match) => match !== null);
    at += inner?.[0].length ?? 1;
  }
  return line.length;
}
