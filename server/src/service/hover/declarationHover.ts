/** What else has a name: layers, families, groups, conductors that nothing declares, what a board states as a whole. */
import { builtInFamilies } from '../../board/builtInFamilies';
import type { CopperRow, NameRecord, PlaneRow, Project, Stackup } from '../../board/model';
import { inText } from '../../units/inText';
import { escaped, escapedLines, paragraphs } from './markdown';

export function declarationHover(project: Project, { kind, name }: NameRecord): string | null {
  switch (kind) {
    case 'copper':
    case 'plane': return layerHover(project, name);
    case 'family': return familyHover(project, name);
    case 'group': return groupHover(project, name);
    case 'conductor': return paragraphs(`**${escaped(name)}**`, 'A guard or a return in a row: part of the reference.');
    case 'board': return boardHover(project, name);
    case 'stackup': return stackupHover(project.stackups.find((stackup) => stackup.name === name));
    default: return null;
  }
}

function layerHover({ stackups }: Project, name: string): string | null {
  for (const stackup of stackups) {
    const index = stackup.rows.findIndex((row) => (row.kind === 'copper' || row.kind === 'plane') && row.name === name);
    if (index < 0) continue;
    const row = stackup.rows[index] as CopperRow | PlaneRow;
    const thickness = inText(row.thickness.value, 'length');
    const what = row.kind === 'plane' ? `a plane of ${thickness}, zero potential` : `copper of ${thickness}${row.undercut === null ? '' : `, each side ${inText(row.undercut.value, 'length')} narrower at the top of a trace`}`;
    return paragraphs(row.documentation === null ? null : escapedLines(row.documentation), `**${escaped(name)}**: ${what}`, distancesInWords(stackup, index));
  }
  return null;
}

/** To the nearest planes, which a run on this layer refers to. */
function distancesInWords({ rows }: Stackup, index: number): string | null {
  const to = (step: 1 | -1, where: string) => {
    let distance = 0;
    for (let at = index + step; 0 <= at && at < rows.length; at += step) {
      const row = rows[at];
      if (row.kind === 'plane') return [`${inText(distance, 'length')} ${where} it lies plane ${escaped(row.name)}`];
      if (row.kind !== 'mask') distance += row.thickness.value;
    }
    return [];
  };
  const said = [...to(-1, 'above'), ...to(1, 'below')];
  return said.length === 0 ? 'No plane lies above or below it.' : `${said.join(', ')}.`;
}

function stackupHover(stackup: Stackup | undefined): string | null {
  if (stackup === undefined) return null;
  const thickness = stackup.rows.reduce((sum, row) => sum + (row.kind === 'mask' ? 0 : row.thickness.value), 0);
  return `**stackup ${escaped(stackup.name ?? '')}**: ${inText(thickness, 'length')} thick without mask`;
}

function familyHover(project: Project, name: string): string | null {
  const own = project.families.get(name);
  const members = [...project.nets.values(), ...project.pairs.values()].filter(({ family }) => family === name);
  const used = members.length === 0 ? 'Nothing is of this family.' : `Of this family: ${members.slice(0, 8).map((member) => escaped(member.name)).join(', ')}${8 < members.length ? ` and ${members.length - 8} more` : ''}.`;
  if (own !== undefined && !own.builtIn) return paragraphs(own.documentation === null ? null : escapedLines(own.documentation), `**family ${escaped(name)}**${own.is === null ? '' : ` is ${escaped(own.is)}`}`, used);
  const builtIn = builtInFamilies.find((family) => family.name === name);
  return builtIn === undefined ? null : paragraphs(`**family ${escaped(name)}**, built in: ${escaped(builtIn.standard)}`, escaped(builtIn.arithmetic), used);
}

function groupHover(project: Project, name: string): string {
  const members = [...project.nets.values(), ...project.pairs.values()].filter(({ switchesWith }) => switchesWith === name);
  return paragraphs(`**${escaped(name)}**: nets that switch at the same moment, so that what they cause adds`, members.map((member) => escaped(member.name)).join(', '));
}

function boardHover({ board }: Project, name: string): string | null {
  if (board.name !== name) return null;
  const sums = board.combine === 'worst' ? 'peaks of unrelated sources add' : 'squares of unrelated peaks add';
  return `**board ${escaped(name)}**: ${inText(board.headroom?.value ?? 0, 'level')} of headroom wanted, ${inText(board.temperature?.value ?? 298.15, 'temperature')}, ${sums}`;
}
