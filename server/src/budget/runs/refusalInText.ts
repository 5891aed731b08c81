import type { RunConductor } from '../../board/model';
import type { SectionRefusal } from '../../physics/section/section';

/** Why a run has no numbers: a clause to follow "run alley:". */
export function refusalInText(refusal: SectionRefusal, conductors: readonly RunConductor[]): string {
  const name = (index: number) => conductorName(conductors[index]);
  switch (refusal.reason) {
    case 'no-reference': return 'neither a plane nor a `return` carries its current back';
    case 'no-signal': return 'it has no trace';
    case 'overlap': return `${name(refusal.first)} and ${name(refusal.second)} overlap`;
    case 'touching': return `${name(refusal.first)} and ${name(refusal.second)} touch`;
    case 'not-in-dielectric': return `${name(refusal.conductor)} does not lie within one layer of the stackup`;
    case 'degenerate': return `${name(refusal.conductor)} has no width or no height`;
    case 'too-many': return `it has more than the ${refusal.limit} conductors that are solved at once`;
    case 'not-covered': return `this cross-section is not yet covered: ${refusal.what}`;
    case 'not-solved': return `its cross-section could not be solved: ${refusal.what}`;
  }
}

function conductorName(conductor: RunConductor | undefined): string {
  if (conductor === undefined) return 'a conductor';
  return conductor.kind === 'trace' ? conductor.net.name : `${conductor.kind} ${conductor.name}`;
}
