import type { Project } from '../board/model';
import { kelvins, type Temperature } from '../units/quantity';

/** 25 °C, the language's default. */
const defaultTemperature = kelvins(298.15);

export function boardTemperature({ board }: Project): Temperature {
  return board.temperature?.value ?? defaultTemperature;
}
