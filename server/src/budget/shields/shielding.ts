/**
 * What the shields of a project let through: of a field from outside, of what a loop emits, and between a loop under a shield and one
 * that is not. A shield never acts on runs, links or returns.
 */
import type { Loop, Net, Pair, Project, Shield } from '../../board/model';
import { materialOf } from '../../physics/shields/materials';
import { throughSheet, throughSlot, type FieldSource } from '../../physics/shields/sheet';
import type { Frequency } from '../../units/quantity';

export type Covered = Net | Pair | Loop;

/** Of shields that cover any of these. */
export function shieldsOver(project: Project, covered: readonly Covered[]): readonly Shield[] {
  return project.shields.filter(({ covers }) => covers.some(({ subject }) => covered.includes(subject)));
}

/** What lies under a shield with a loop: itself, and whom it serves. */
export function underLoop(loop: Loop): readonly Covered[] {
  return [loop, ...loop.carries.map(({ net }) => net), ...loop.senses.map(({ signal }) => signal)];
}

/** Of shields over one of two loops and not over the other. */
export function shieldsBetween(project: Project, one: Loop, other: Loop): readonly Shield[] {
  const [over, under] = [shieldsOver(project, underLoop(one)), shieldsOver(project, underLoop(other))];
  return [...over.filter((shield) => !under.includes(shield)), ...under.filter((shield) => !over.includes(shield))];
}

/** Of the field, 0 to 1: what goes through the sheet and what goes through its longest opening, in step at worst. */
export function throughShields(shields: readonly Shield[], source: FieldSource, frequency: Frequency): number {
  return shields.reduce((product, shield) => product * throughShield(shield, source, frequency), 1);
}

export function throughShield({ sheet, slot, grounded }: Shield, source: FieldSource, frequency: Frequency): number {
  // One that floats takes on the field's potential and hands it on; against a magnetic field it acts all the same.
  if (grounded !== true && source.kind !== 'magnetic') return 1;
  const material = sheet === null ? null : materialOf(sheet.material);
  const metal = material === null || sheet === null ? 1 : throughSheet({ ...material, thickness: sheet.thickness.value }, source, frequency);
  return Math.min(1, metal + (slot === null ? 1 : throughSlot(slot.value, frequency)));
}

/** What a number under these shields rests on. */
export function shieldsInWords(shields: readonly Shield[]): readonly string[] {
  return shields.map(({ name, grounded, sheet }) => {
    if (grounded !== true) return `shield ${name} floats, and counts for nothing but against magnetic fields`;
    return `shield ${name} lets through what its sheet and its longest opening let through${sheet === null ? '; no sheet is stated, so all of it' : ''}: wires that pass through it are not counted`;
  });
}
