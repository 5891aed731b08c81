import type { Loop } from '../board/model';
import type { EmissionResult } from '../budget/results';
import { inText } from '../units/inText';
import { defineRule, type Fault } from './rule';

export interface EmissionOverLimit extends Fault {
  readonly loop: Loop;
  readonly worst: EmissionResult;
}

export const emissionOverLimit = defineRule<EmissionOverLimit>({
  name: 'emission-over-limit',
  severity: 'error',
  documentation: {
    finds: 'A loop whose field, at the distance of an `emits at most` line of its board, is over that line.',
    matters: 'A loop that is over a limit by itself fails it whatever else the board does right. The other way round nothing follows: currents on attached cables are not included and often dominate, and a board without this finding may still fail its test.',
    bad: `board b { emits at most 40 dBuV/m at 3 m from 30 MHz to 230 MHz }
net CLOCK { swing 3.3 V; rise 1 ns; source 20 ohm; load 50 ohm; repeats 25 MHz }
loop clock-loop { carries CLOCK; rectangle 40 mm by 20 mm; wire 0.3 mm }
`,
    good: `board b { emits at most 40 dBuV/m at 3 m from 30 MHz to 230 MHz }
net CLOCK { swing 3.3 V; rise 1 ns; source 20 ohm; load 50 ohm; repeats 25 MHz }
loop clock-loop { carries CLOCK; rectangle 10 mm by 2 mm; wire 0.3 mm }
`,
    models: ['fields/smallLoopEmission', 'noise/harmonics'],
  },

  *find({ loops }) {
    for (const { loop, emission } of loops) {
      for (const worst of emission) {
        if (worst.field <= worst.limit.field.value) continue;
        yield { at: loop.place, subject: { kind: 'loop', name: loop.name }, names: [loop.name, `${worst.limit.distance.value} ${worst.limit.from.value}`], related: [{ place: worst.limit.place, message: 'the limit' }], value: worst.field, limit: worst.limit.field.value, unit: 'V/m', loop, worst };
      }
    }
  },

  message: ({ loop, worst: { limit, field, frequency } }) => {
    const excess = inText(20 * Math.log10(field / limit.field.value), 'level');
    return `${levelInText(field)} at ${inText(frequency, 'frequency')}, ${inText(limit.distance.value, 'length')} from loop ${loop.name}, where ${levelInText(limit.field.value)} is the limit: ${excess} too much. Make the loop smaller, slow its edge, or shield it. Currents on attached cables are not included and often dominate, and this does not predict a test result`;
  },
});

/** As limits are stated. */
export function levelInText(field: number): string {
  return `${(20 * Math.log10(field / 1e-6)).toFixed(1)} dBµV/m`;
}
