/** In which set of a project's names one is looked up that stands where the grammar wants a kind. */
import type { NameSet } from '../board/model';
import type { NameKind } from '../syntax/grammar';

export const setsOf: Readonly<Record<NameKind, readonly NameSet[]>> = {
  copper: ['layer'], plane: ['layer'], family: ['family'], net: ['signal'], pair: ['signal'], loop: ['signal'], group: ['group'], run: ['run'], return: ['return'],
  link: ['link'], shield: ['shield'], ambient: ['ambient'], board: ['board'], stackup: ['stackup'], any: ['signal'], free: ['conductor'],
};
