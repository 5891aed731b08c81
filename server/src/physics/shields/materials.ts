/**
 * What shields are made of.
 *
 * Source    conductivities relative to copper, 5.8e7 S/m (IEC 60028), and permeability: tables in Ott, Electromagnetic Compatibility
 *           Engineering, and Paul, Introduction to Electromagnetic Compatibility, from memory. Steel counts with a permeability of 100, a
 *           tenth of what it has at low frequency, since it loses that with frequency and with saturation
 * Accuracy  some tens of per cent: alloys differ
 */
const copper = 5.8e7;

const materials: ReadonlyMap<string, { readonly conductivity: number; readonly permeability: number }> = new Map([
  ['copper', { conductivity: copper, permeability: 1 }],
  ['aluminium', { conductivity: 0.61 * copper, permeability: 1 }],
  ['brass', { conductivity: 0.26 * copper, permeability: 1 }],
  ['tin', { conductivity: 0.15 * copper, permeability: 1 }],
  ['steel', { conductivity: 0.1 * copper, permeability: 100 }],
  ['nickel-silver', { conductivity: 0.06 * copper, permeability: 1 }],
]);

export function materialOf(name: string): { readonly conductivity: number; readonly permeability: number } | null {
  return materials.get(name) ?? null;
}
