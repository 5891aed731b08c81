/**
 * What a linear edge is called by: its 10-90 % time, its whole duration, and the frequency up to which it
 * has most of its spectrum.
 *
 * Formula   T = rise / 0.8 (exact for a linear ramp); knee = 0.35 / rise
 * Source    0.35 / rise is common practice: the -3 dB corner of a first-order low pass with that 10-90 % time
 *           (ln 9 / 2 pi = 0.3497)
 */
import { hertz, seconds, type Frequency, type Time } from '../../units/quantity';

export function kneeFrequency(rise: Time): Frequency {
  return hertz(0.35 / rise);
}

/** 0-100 % of a linear edge. */
export function rampDuration(rise: Time): Time {
  return seconds(rise / 0.8);
}
