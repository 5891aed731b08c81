import type { Loop } from '../board/model';
import { inText } from '../units/inText';
import { defineRule, type Fault } from './rule';

export interface LoopTooLarge extends Fault {
  readonly loop: Loop;
  readonly what: 'area' | 'inductance';
  readonly value: number;
  readonly limit: number;
}

export const loopTooLarge = defineRule<LoopTooLarge>({
  name: 'loop-too-large',
  severity: 'error',
  documentation: {
    finds: 'A loop over the `area` or the `inductance` that it states as its limit.',
    matters: 'What a loop emits and what it picks up both grow with its area, and the voltage that its own current drops along it with its inductance. A limit on either is a promise to the layout: it holds at every revision only if something checks it.',
    bad: `net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
loop valve-switch {
  carries    VALVE_PWM
  rectangle  22 mm by 9 mm
  strip      1 mm
  area       at most 120 mm2
  inductance at most 25 nH
}
`,
    good: `net VALVE_PWM { swing 24 V; rise 40 ns; source 5 ohm; load 10 kohm, 470 pF }
loop valve-switch {
  carries    VALVE_PWM
  rectangle  14 mm by 4 mm
  strip      2 mm
  area       at most 120 mm2
  inductance at most 25 nH
}
`,
    models: ['loops/contourMeasures', 'loops/selfInductance'],
  },

  *find({ loops }) {
    for (const { loop, area, inductance } of loops) {
      const over = (what: LoopTooLarge['what'], value: number | null, given: Loop['areaLimit'] | Loop['inductanceLimit']) =>
        value === null || given === null || value <= given.value ? [] : [{ at: given.place, subject: { kind: 'loop' as const, name: loop.name }, names: [loop.name, what], related: shapeOf(loop), loop, what, value, limit: given.value, unit: what === 'area' ? 'm2' : 'H' }];
      yield* over('area', area, loop.areaLimit);
      if (loop.inductanceLimit !== null) yield* over('inductance', inductance, loop.inductanceLimit);
    }
  },

  message: ({ loop, what, value, limit }) => {
    const ratio = value / limit;
    const share = ratio < 10 ? `${Math.round((ratio - 1) * 100)} % too much` : `${Math.round(ratio)} times as much`;
    const way = what === 'area' ? smaller(loop) : `${smaller(loop)}, widen its conductor, or lay it over a plane`;
    return `${inText(value, what)} of ${inText(limit, what)} in loop ${loop.name}, ${share}. ${way}`;
  },
});

function smaller({ shape }: Loop): string {
  switch (shape?.form) {
    case 'circle': return 'Make it narrower';
    case 'trace': return 'Shorten it';
    default: return 'Bring its sides together';
  }
}

function shapeOf({ shape }: Loop) {
  return shape === null ? [] : [{ place: shape.place, message: 'its shape' }];
}
