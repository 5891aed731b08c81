/**
 * Which budgets may lack something because a declaration could not be read: those of the nets and pairs
 * that it names, and of everything that noise could reach from there.
 *
 * Kept on the safe side: a budget that is called incomplete needlessly is looked at again; one that
 * passes for want of a line is not.
 */
import type { Statement } from '../syntax/tree';
import type { Declaration, Declarations } from './declarations';
import type { Families } from './families';
import type { Gap, Net, Pair } from './model';
import type { Owner, PendingGap } from './resolution';

export interface AffectedContext {
  readonly declarations: Declarations;
  readonly families: Families['families'];
  readonly nets: ReadonlyMap<string, Net>;
  readonly pairs: ReadonlyMap<string, Pair>;
}

export function withAffected(gaps: readonly PendingGap[], context: AffectedContext): readonly Gap[] {
  // A board without a gap, the usual case, pays nothing.
  const affected = gaps.length === 0 ? () => null : affectedBy(context);
  return gaps.map(({ owner, what, place }) => ({ affects: affected(owner), what, place }));
}

/** Answers once for each declaration, however many gaps it has. */
function affectedBy(context: AffectedContext): (owner: Owner) => readonly string[] | null {
  const links = new Links(context);
  const known = new Map<Statement | null, readonly string[] | null>();
  return (owner) => {
    if (!known.has(owner.statement)) known.set(owner.statement, affects(owner, context, links));
    return known.get(owner.statement)!;
  };
}

function affects(owner: Owner, { declarations, families, nets, pairs }: AffectedContext, links: Links): readonly string[] | null {
  switch (owner.kind) {
    case 'file':
    case 'board':
    case 'ambient': return null;
    // Runs, loops and returns that need the row have gaps of their own.
    case 'stackup':
    case 'waive': return [];
    // What a net without a name would have been is not known.
    case 'family': return owner.names.length === 0 ? null : links.reachedFrom([...nets.values(), ...pairs.values()].filter(({ family }) => isWithin(family, owner.names, families)).map(({ name }) => name));
    case 'net':
    case 'pair': return owner.names.length === 0 ? null : links.reachedFrom(owner.names);
    case 'run':
    case 'link': return links.withPairs(links.named(owner));
    case 'return': return links.withPairs(links.named(owner, 'carries'));
    case 'loop': return links.withPairs([...links.named(owner, 'carries'), ...links.sensed]);
    // A shield weakens what the ambient fields do to every receiver under it, and what loops do to each other.
    case 'shield': return 0 < declarations.ambient.length ? null : links.withPairs([...links.named(owner), ...links.sensed]);
  }
}

function isWithin(family: string | null, names: readonly string[], families: Families['families']): boolean {
  const seen = new Set<string>();
  for (let at = family; at !== null && !seen.has(at); at = families.get(at)?.is ?? null) {
    if (names.includes(at)) return true;
    seen.add(at);
  }
  return false;
}

/** Who lies beside whom, by what the text names, whether or not the run, link, loop or return could be read. */
class Links {
  /** Every net and pair in which a loop's voltage appears. */
  readonly sensed: readonly string[];
  private readonly groups: readonly (readonly string[])[];
  private readonly groupsOf = new Map<string, number[]>();
  private readonly pairsOf = new Map<string, string[]>();
  private readonly carriers = new Set<string>();
  private readonly declarationOf = new Map<Statement, Declaration>();

  constructor(private readonly context: AffectedContext) {
    const { declarations, pairs } = context;
    for (const declaration of Object.values(declarations).flat()) this.declarationOf.set(declaration.statement, declaration);
    for (const pair of pairs.values()) for (const net of [pair.plus, pair.minus]) if (net !== null) this.pairsOf.set(net.name, [...(this.pairsOf.get(net.name) ?? []), pair.name]);
    this.sensed = declarations.loop.flatMap((loop) => this.namesIn(loop, 'carries'));
    for (const loop of declarations.loop) for (const name of this.namesIn(loop, 'senses')) this.carriers.add(name);
    this.groups = [...declarations.run, ...declarations.link, ...declarations.return].map((declaration) => this.namesIn(declaration));
    this.groups.forEach((group, index) => group.forEach((name) => this.groupsOf.set(name, [...(this.groupsOf.get(name) ?? []), index])));
  }

  named(owner: Owner, except?: string): readonly string[] {
    const declaration = this.declarationOf.get(owner.statement!);
    return declaration === undefined ? [] : this.namesIn(declaration, except);
  }

  /** These, what lies beside them, and what loops carry from them. */
  reachedFrom(names: readonly string[]): readonly string[] {
    const origins = new Set(names);
    for (const name of names) {
      const pair = this.context.pairs.get(name);
      for (const net of [pair?.plus, pair?.minus]) if (net != null) origins.add(net.name);
    }
    const reached = new Set(origins);
    for (const name of origins) {
      for (const group of this.groupsOf.get(name) ?? []) for (const other of this.groups[group]) reached.add(other);
      if (this.carriers.has(name)) for (const other of this.sensed) reached.add(other);
    }
    return this.withPairs([...reached]);
  }

  withPairs(names: readonly string[]): readonly string[] {
    return [...new Set(names.flatMap((name) => [name, ...(this.pairsOf.get(name) ?? [])]))];
  }

  /** Nets and pairs that stand in a declaration, in lines that could not be read too. */
  private namesIn({ statement, scope }: Declaration, except?: string): readonly string[] {
    const words = new Set(scope.unreadable.wordsIn(statement.span));
    const visit = ({ keyword, values, block }: Statement) => {
      if (keyword !== except) for (const value of values) if (value.kind === 'name') for (const name of value.range ?? [value.name]) words.add(name);
      block?.statements.forEach(visit);
    };
    visit(statement);
    return [...words].filter((name) => this.context.nets.has(name) || this.context.pairs.has(name));
  }
}
