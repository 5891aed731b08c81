/**
 * From the trees of a root and of the files it uses to the board that they describe: names resolved,
 * values in SI and checked for what can be, and a list of what could not be read.
 *
 * A pure function of the sources: the same texts give an equal project, whatever was resolved before.
 */
import { withAffected } from './affected';
import { resolveAmbients } from './ambients';
import { boardSettings } from './boardSettings';
import { closureOf, type Closure } from './closure';
import { declarationsOf } from './declarations';
import { enterBuiltInFamilies, resolveFamilies } from './families';
import { resolveLinks } from './links';
import { resolveLoops } from './loops';
import type { BoardError, Project } from './model';
import { Resolution, type Owner } from './resolution';
import { resolveReturns } from './returns';
import { resolveRuns } from './runs';
import { resolveShields } from './shields';
import { checkSampledGroups, resolveNets, resolvePairs } from './signals';
import type { Sources } from './sources';
import { enterLayers, resolveStackups } from './stackups';
import { addTextGaps } from './textGaps';
import { resolveWaivers } from './waivers';

export function resolveProject(root: string, sources: Sources): Project {
  const closure = closureOf(root, sources);
  const { files, includes } = closure;
  const resolution = new Resolution(files, 0 < closure.unread.length);
  const declarations = declarationsOf(files, resolution);
  const layerSlots = enterLayers(declarations.stackup);
  enterBuiltInFamilies(resolution);

  const board = boardSettings(declarations.board);
  const layers = resolveStackups(layerSlots);
  const families = resolveFamilies(declarations.family);
  const nets = resolveNets(declarations.net, families);
  const pairs = resolvePairs(declarations.pair, families, nets);
  const runs = resolveRuns(declarations.run, { layers, nets });
  const loops = resolveLoops(declarations.loop, { layers, nets, pairs });
  const returns = resolveReturns(declarations.return, { layers, nets, pairs });
  const links = resolveLinks(declarations.link, nets);
  const shields = resolveShields(declarations.shield, { nets, pairs, loops });
  const ambients = resolveAmbients(declarations.ambient);
  const waivers = resolveWaivers(declarations);
  checkSampledGroups(resolution);
  addTextGaps(files, declarations, resolution);
  addIncludeGaps(closure, resolution);

  const gaps = withAffected(resolution.gaps, { declarations, families: families.families, nets, pairs });
  return {
    root, files: files.map(({ path }) => path), board, stackups: layers.all.map(({ stackup }) => stackup),
    families: families.families, nets, pairs, runs, loops, returns, links, shields, ambients, waivers, includes,
    names: resolution.names.frozen((name) => resolution.isInUnreadable(name)),
    complete: gaps.length === 0, gaps, errors: [...textErrors(closure), ...closure.errors, ...resolution.errors],
  };
}

function textErrors({ files }: Closure): readonly BoardError[] {
  return files.flatMap(({ path, tree }) => tree.errors.map(({ rule, span, message, corrections }) => ({
    rule, message, place: { path, span }, related: [],
    corrections: corrections.map(({ title, span: at, newText }) => ({ title, place: { path, span: at }, newText })),
  })));
}

/** What a file that is not there would have said concerns every budget. */
function addIncludeGaps({ unread, includes }: Closure, resolution: Resolution): void {
  for (const place of unread) {
    const owner: Owner = { kind: 'file', names: [], called: place.path, statement: null, path: place.path };
    resolution.gaps.push({ owner, what: includes.some((include) => include.place === place) ? 'a file that is used' : 'the file', place });
  }
}
