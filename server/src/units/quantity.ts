/**
 * Quantities, each type one SI unit: a Length is metres, whatever it was written in.
 *
 * Branded numbers: they cost nothing at run time and keep a length from being handed in where a
 * time is due. Arithmetic yields a plain number, to be branded again at the door it leaves by.
 */
declare const unit: unique symbol;
type Quantity<Unit extends string> = number & { readonly [unit]: Unit };

export type Length = Quantity<'m'>;
export type Area = Quantity<'m2'>;
export type Time = Quantity<'s'>;
export type Frequency = Quantity<'Hz'>;
export type Voltage = Quantity<'V'>;
export type Current = Quantity<'A'>;
export type Resistance = Quantity<'ohm'>;
export type Capacitance = Quantity<'F'>;
export type Inductance = Quantity<'H'>;
export type Temperature = Quantity<'K'>;
export type Angle = Quantity<'rad'>;
export type FieldStrength = Quantity<'V/m'>;
export type VoltageNoiseDensity = Quantity<'V/rtHz'>;
export type CurrentNoiseDensity = Quantity<'A/rtHz'>;
/** A level as written, in decibels; never a ratio. */
export type Decibels = Quantity<'dB'>;
/** A ratio: 0.1 for 10 %. */
export type Ratio = Quantity<'1'>;
export type CapacitancePerLength = Quantity<'F/m'>;
export type InductancePerLength = Quantity<'H/m'>;
export type DelayPerLength = Quantity<'s/m'>;

export const metres = (value: number) => value as Length;
export const squareMetres = (value: number) => value as Area;
export const seconds = (value: number) => value as Time;
export const hertz = (value: number) => value as Frequency;
export const volts = (value: number) => value as Voltage;
export const amperes = (value: number) => value as Current;
export const ohms = (value: number) => value as Resistance;
export const farads = (value: number) => value as Capacitance;
export const henries = (value: number) => value as Inductance;
export const kelvins = (value: number) => value as Temperature;
export const radians = (value: number) => value as Angle;
export const voltsPerMetre = (value: number) => value as FieldStrength;
export const voltageNoiseDensity = (value: number) => value as VoltageNoiseDensity;
export const currentNoiseDensity = (value: number) => value as CurrentNoiseDensity;
export const decibels = (value: number) => value as Decibels;
export const ratio = (value: number) => value as Ratio;
export const faradsPerMetre = (value: number) => value as CapacitancePerLength;
export const henriesPerMetre = (value: number) => value as InductancePerLength;
export const secondsPerMetre = (value: number) => value as DelayPerLength;
