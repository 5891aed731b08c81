import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Dimension } from '../../server/src/units/dimension';
import { inSource } from '../../server/src/units/inSource';
import { inText } from '../../server/src/units/inText';
import { parse } from '../../server/src/syntax/parse';
import { seeded } from '../support/seeded';

describe('quantities in text', () => {
  const shown: readonly (readonly [number, Dimension, string])[] = [
    [0.92e-3, 'length', '0.92 mm'], [38e-3, 'length', '38 mm'], [35e-6, 'length', '35 µm'], [1.234, 'length', '1.23 m'], [0.12345e-3, 'length', '0.123 mm'],
    [99.97e-6, 'length', '0.1 mm'], [0.9999, 'length', '1 m'], [0, 'length', '0 mm'], [-0.1e-3, 'length', '-0.1 mm'], [1.6e-3, 'length', '1.6 mm'], [1e-9, 'length', '0.001 µm'],
    [198e-6, 'area', '198 mm²'], [1.204e-4, 'area', '120 mm²'], [2, 'area', '2 m²'],
    [40e-9, 'time', '40.0 ns'], [999.6e-9, 'time', '1.00 µs'], [1e-12, 'time', '1.00 ps'], [0, 'time', '0 s'],
    [1e-3, 'voltage', '1.00 mV'], [5.3e-3, 'voltage', '5.30 mV'], [-0.02, 'voltage', '-20.0 mV'], [230, 'voltage', '230 V'], [12345, 'voltage', '12.3 kV'], [1e300, 'voltage', '1.00e300 V'], [1e-40, 'voltage', '1.00e-40 V'],
    [50, 'resistance', '50.0 Ω'], [4700, 'resistance', '4.70 kΩ'], [470e-12, 'capacitance', '470 pF'], [21e-9, 'inductance', '21.0 nH'], [20e3, 'frequency', '20.0 kHz'],
    [5e-9, 'voltage-noise', '5.00 nV/√Hz'], [2e-12, 'current-noise', '2.00 pA/√Hz'], [1e-4, 'field', '100 µV/m'],
    [328.15, 'temperature', '55 °C'], [298.16, 'temperature', '25 °C'], [296.65, 'temperature', '23.5 °C'], [6, 'level', '6.0 dB'], [-0.01, 'level', '0.0 dB'], [-3.26, 'level', '-3.3 dB'],
    [0.1, 'fraction', '10 %'], [2.654, 'fraction', '265 %'], [0.01234, 'fraction', '1.23 %'], [Math.PI / 2, 'angle', '90°'], [4.2, 'number', '4.2'], [1e9, 'number', '1e9'],
    [NaN, 'voltage', '? V'], [Infinity, 'resistance', '∞ Ω'], [-Infinity, 'level', '-∞ dB'],
  ];
  for (const [value, dimension, text] of shown) it(`shows ${value} as ${text}`, () => assert.equal(inText(value, dimension), text));
});

describe('quantities in source', () => {
  const spelt: readonly (readonly [number, Dimension, string])[] = [
    [0.92e-3, 'length', '0.92 mm'], [35e-6, 'length', '35 um'], [1.5, 'length', '1.5 m'], [0.09999e-3, 'length', '0.1 mm'], [99e-6, 'length', '99 um'], [0, 'length', '0 mm'], [0, 'time', '0 s'], [0, 'area', '0 mm2'],
    [40e-9, 'time', '40 ns'], [999.9e-9, 'time', '1 us'], [4700, 'resistance', '4.7 kohm'], [33, 'resistance', '33 ohm'], [2.2e-12, 'capacitance', '2.2 pF'], [298.15, 'temperature', '25 degC'],
    [0.5, 'fraction', '50 %'], [198e-6, 'area', '198 mm2'], [6, 'level', '6 dB'],
  ];
  for (const [value, dimension, text] of spelt) it(`writes ${value} as ${text}`, () => assert.equal(inSource(value, dimension), text));

  it('is read back to three figures', () => {
    const random = seeded(7);
    const statements: readonly (readonly [Dimension, string])[] = [['length', 'clearance'], ['level', 'headroom'], ['temperature', 'temperature']];
    for (let count = 0; count < 300; count += 1) {
      const [dimension, keyword] = statements[count % statements.length]!;
      const value = dimension === 'length' ? 10 ** (random() * 9 - 7) : 250 + 100 * random();
      const tree = parse(`board b { ${keyword} ${inSource(value, dimension)} }`);
      assert.deepEqual(tree.errors, []);
      const [read] = tree.statements[0]!.block!.statements[0]!.values;
      assert.ok(read?.kind === 'quantity' && Math.abs(read.value - value) <= 6e-3 * Math.abs(value), `${inSource(value, dimension)} for ${value}`);
    }
  });
});
