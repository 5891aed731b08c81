/**
 * Round wires, one dielectric of relative permittivity 1.
 *
 *    o --- s --- o      a  radius      h  axis above the plane      s  axis to axis
 *    | h         | h
 *   ===============     Source: method of images and bipolar coordinates; textbook forms, from memory
 */
import { epsilon0, mu0 } from '../../../server/src/units/constants';

/** F/m, one wire over a plane. Exact. */
export const wireOverPlaneCapacitance = (a: number, h: number) => (2 * Math.PI * epsilon0) / Math.acosh(h / a);

/** F/m between two wires in free space. Exact. */
export const twoWireCapacitance = (a: number, s: number) => (Math.PI * epsilon0) / Math.acosh(s / (2 * a));

/** H/m, loop of two wires in free space. Exact. */
export const twoWireInductance = (a: number, s: number) => (mu0 / Math.PI) * Math.acosh(s / (2 * a));

/** H/m, mutual of two wires over a plane; leaves proximity out: (a/s)² small. */
export const mutualOverPlane = (s: number, h1: number, h2: number) => (mu0 / (4 * Math.PI)) * Math.log1p((4 * h1 * h2) / (s * s));

/** Radius of the round wire that a thin square wire of this side equals: its logarithmic capacity, Gamma(1/4)² / (4 pi^1.5) times the side. */
export const squareWireRadius = (side: number) => 0.5901702995080481 * side;
