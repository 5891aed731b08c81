import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { Dimension } from '../../server/src/units/dimension';
import { dimensionInWords, exampleOf, fittingUnits, unitsMeantBy, unitSpelt, type WrittenNumber } from '../../server/src/units/spelling';

const read = (digits: string, spelling: string): number | undefined => unitSpelt(spelling)?.inSi(written(digits));
const written = (digits: string): WrittenNumber => ({ digits, exponent: 0 });
const prefixes = { f: 1e-15, p: 1e-12, n: 1e-9, u: 1e-6, '\u00b5': 1e-6, '\u03bc': 1e-6, m: 1e-3, k: 1e3, M: 1e6, G: 1e9, T: 1e12 };

describe('units', () => {
  it('takes every prefix with every unit that the language lists', () => {
    const symbols: Record<string, Dimension> = { V: 'voltage', A: 'current', ohm: 'resistance', '\u03a9': 'resistance', '\u2126': 'resistance', R: 'resistance', F: 'capacitance', H: 'inductance', s: 'time', Hz: 'frequency', m: 'length', K: 'temperature', 'V/m': 'field', 'V/rtHz': 'voltage-noise', 'A/rtHz': 'current-noise' };
    for (const [symbol, dimension] of Object.entries(symbols)) {
      for (const [prefix, size] of [['', 1] as const, ...Object.entries(prefixes)]) {
        assert.equal(unitSpelt(prefix + symbol)?.dimension, dimension, prefix + symbol);
        assert.equal(read('3', prefix + symbol), Number(`3e${Math.round(Math.log10(size))}`), prefix + symbol);
      }
    }
  });

  it('takes no prefix with the others', () => {
    for (const [prefix] of Object.entries(prefixes)) {
      for (const symbol of ['cm', 'mil', 'in', 'oz', 'degC', '\u00b0C', 'dB', '%', 'deg', '\u00b0', 'dBuV/m', 'mm2', 'cm2']) assert.equal(unitSpelt(prefix + symbol), undefined, prefix + symbol);
    }
  });

  // Exact by definition: the international inch is 25.4 mm. The ounce of copper is 35 um by definition of the language.
  it('knows the units without prefix', () => {
    assert.equal(read('1', 'cm'), 0.01);
    assert.equal(read('1', 'mil'), 25.4e-6);
    assert.equal(read('1', 'in'), 0.0254);
    assert.equal(read('1', 'oz'), 35e-6);
    assert.equal(read('25', 'degC'), 298.15);
    assert.equal(read('-40', '\u00b0C'), 233.14999999999998);
    assert.equal(read('180', 'deg'), Math.PI);
    assert.equal(read('30', '%'), 0.3);
    assert.equal(read('-20', 'dB'), -20);
    assert.equal(read('120', 'mm2'), 120e-6);
    assert.equal(read('120', 'mm\u00b2'), 120e-6);
    assert.equal(read('3', 'cm2'), 3e-4);
    assert.equal(read('3', 'm\u00b2'), 3);
  });

  // 0 dB over 1 uV/m is 1 uV/m; 20 dB are a factor of ten.
  it('converts a field in decibels', () => {
    assert.equal(read('0', 'dBuV/m'), 1e-6);
    assert.equal(read('40', 'dB\u00b5V/m'), 1e-4);
    assert.equal(read('120', 'dBuV/m'), 1);
    assert.ok(Math.abs(read('6', 'dBuV/m')! / 1.9952623149688795e-6 - 1) < 1e-15);
  });

  it('rounds once: a prefixed number is the double nearest to its decimal value', () => {
    assert.equal(read('0.3', 'mm'), 3e-4);
    assert.equal(read('0.07', 'mm'), 7e-5);
    assert.equal(read('4.7', 'pF'), 4.7e-12);
    assert.equal(read('33', '%'), 0.33);
    assert.equal(unitSpelt('mV')?.inSi({ digits: '2.5', exponent: 2 }), 0.25);
  });

  it('tells upper from lower case', () => {
    assert.equal(unitSpelt('MHZ'), undefined);
    assert.equal(unitSpelt('S'), undefined);
    assert.equal(read('1', 'mV'), 1e-3);
    assert.equal(read('1', 'MV'), 1e6);
    assert.equal(unitSpelt('Ohm'), undefined);
    assert.equal(unitSpelt('constructor'), undefined);
    assert.equal(unitSpelt('__proto__'), undefined);
  });

  it('finds what was meant by the wrong case, or by a prefix alone', () => {
    assert.deepEqual(unitsMeantBy('MM', ['length']), ['mm']);
    assert.deepEqual(unitsMeantBy('KHZ', ['frequency']), ['kHz']);
    assert.deepEqual(unitsMeantBy('PHZ', ['frequency']), ['pHz']);
    assert.deepEqual(unitsMeantBy('MOHM', ['resistance', 'capacitance']), ['Mohm', 'mohm']);
    assert.deepEqual(unitsMeantBy('k', ['resistance', 'capacitance']), ['kohm']);
    assert.deepEqual(unitsMeantBy('n', ['resistance', 'capacitance']), ['nF']);
    assert.deepEqual(unitsMeantBy('parsec', ['length']), []);
  });

  it('offers only units that are read, and examples of every dimension', () => {
    const dimensions: readonly Dimension[] = ['length', 'area', 'time', 'frequency', 'voltage', 'current', 'resistance', 'capacitance', 'inductance', 'temperature', 'level', 'fraction', 'angle', 'field', 'voltage-noise', 'current-noise'];
    for (const dimension of dimensions) {
      assert.notEqual(fittingUnits(dimension).length, 0);
      for (const unit of fittingUnits(dimension)) assert.equal(unitSpelt(unit)?.dimension, dimension, unit);
      const [number, unit] = exampleOf(dimension).split(' ') as [string, string];
      assert.ok(Number.isFinite(Number(number)));
      assert.equal(unitSpelt(unit)?.dimension, dimension);
      assert.match(dimensionInWords(dimension), /^an? /);
    }
  });
});
