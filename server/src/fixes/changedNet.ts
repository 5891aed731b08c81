/** A board of which one net or pair is another: wherever it is named, the changed one stands. */
import type { Loop, Net, Pair, Project, Run, RunConductor, SharedReturn } from '../board/model';

export function withSignal(project: Project, before: Net | Pair, after: Net | Pair): Project {
  const net = (each: Net): Net => (each === before ? (after as Net) : each);
  const pairs = new Map([...project.pairs].map(([name, pair]) => [name, pair === before ? (after as Pair) : withNets(pair, net)]));
  const signal = (each: Net | Pair): Net | Pair => (each.kind === 'net' ? net(each) : (pairs.get(each.name) ?? each));
  return {
    ...project,
    nets: new Map([...project.nets].map(([name, each]) => [name, net(each)])),
    pairs,
    runs: project.runs.map((run) => runWith(run, net)),
    loops: project.loops.map((loop): Loop => ({ ...loop, carries: loop.carries.map((each) => ({ ...each, net: net(each.net) })), senses: loop.senses.map((each) => ({ ...each, signal: signal(each.signal) })) })),
    returns: project.returns.map((shared): SharedReturn => ({ ...shared, carries: shared.carries.map((each) => ({ ...each, net: net(each.net) })), refers: shared.refers.map((each) => ({ ...each, signal: signal(each.signal) })) })),
    links: project.links.map((link) => ({ ...link, from: net(link.from), to: net(link.to) })),
  };
}

type Replaced = (net: Net) => Net;

function withNets(pair: Pair, net: Replaced): Pair {
  const [plus, minus] = [pair.plus && net(pair.plus), pair.minus && net(pair.minus)];
  return plus === pair.plus && minus === pair.minus ? pair : { ...pair, plus, minus };
}

/** A run without the net stays the same object. */
function runWith(run: Run, net: Replaced): Run {
  const conductor = (each: RunConductor): RunConductor => (each.kind === 'trace' && net(each.net) !== each.net ? { ...each, net: net(each.net) } : each);
  const rows = run.rows.map((row) => {
    const conductors = row.conductors.map(conductor);
    return conductors.every((each, at) => each === row.conductors[at]) ? row : { ...row, conductors };
  });
  return rows.every((row, at) => row === run.rows[at]) ? run : { ...run, rows };
}
