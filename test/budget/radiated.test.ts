/** Fields from outside: the small-loop limit, a reference case, modulation, bands, and what lies between planes. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import reference from '../reference/fields-and-noise.json';
import { budgetOf, evaluated, microstrip } from './board';

const open = 'net V { source 0 ohm; load 1 Gohm; tolerates 1 V peak }\n';
const picked = (text: string, name = 'V', measure: 'peak' | 'rms' = 'peak') => budgetOf(evaluated(text), name, measure).contributions.filter(({ channel }) => channel === 'radiated');
const etaOf = 4e-7 * Math.PI * 299792458;
const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };

describe('a field from outside', () => {
  it('D-loop-pickup-1: brings w A B to a small loop that is open (Faraday)', () => {
    const { inputs_SI: { f, E, area }, outputs } = caseOf('D-loop-pickup-1');
    const side = Math.sqrt(area) * 1e3;
    const [found] = picked(`${open}loop in { senses V; rectangle ${side} mm by ${side} mm }\nambient radio { field ${E} V/m from ${f} Hz to ${f} Hz }`);
    // 20 mm are a 150th of the wavelength: the limit is met to a part in a thousand.
    near(found.value / Math.SQRT2, outputs.V, 3e-3);
    assert.deepEqual([found.from, found.where, found.channel], ['radio', 'in', 'radiated']);
  });

  it('of 10 V/m with 80 % AM has a crest of 25.5 V/m (IEC 61000-4-3)', () => {
    const value = (more: string) => picked(`${open}loop in { senses V; rectangle 10 mm by 10 mm }\nambient radio { field 10 V/m from 100 MHz to 100 MHz ${more} }`)[0].value;
    near((value('modulated 80 %') / value('')) * 10 * Math.SQRT2, 25.456, 1e-4);
  });

  it('counts its worst frequency', () => {
    const value = (range: string) => picked(`${open}loop in { senses V; rectangle 10 mm by 10 mm }\nambient radio { field 1 V/m from ${range} }`)[0].value;
    near(value('80 MHz to 1 GHz'), value('1 GHz to 1 GHz'), 1e-6);
    near(value('200 MHz to 200 MHz') / value('100 MHz to 100 MHz'), 2, 2e-2);
  });

  it('is less than w A B in a larger loop, by the line integral', () => {
    const value = (side: number) => picked(`${open}loop in { senses V; rectangle ${side} mm by ${side} mm }\nambient radio { field 1 V/m from 1 GHz to 1 GHz }`)[0].value / (side * side);
    assert.ok(value(120) < 0.85 * value(5));
  });

  it('reaches a trace against its plane: twice the incident flux of its height', () => {
    // h = 0.2 mm + half of 35 µm; incident and reflected H add at the plane: V = w mu0 (2 E/eta) h l while it is short.
    const [found] = picked(`${microstrip}${open}net Q { }\nrun r on TOP for 20 mm { trace V 0.2 mm; gap 9 mm; trace Q 0.2 mm }\nambient radio { field 10 V/m from 30 MHz to 30 MHz }`);
    const exact = Math.SQRT2 * 2 * Math.PI * 30e6 * 4e-7 * Math.PI * ((2 * 10) / etaOf) * (0.2175e-3 * 20e-3);
    near(found.value, exact, 2e-2);
    assert.equal(found.where, 'r');
  });

  it('does not get in between two planes', () => {
    const buried = 'stackup { plane A 18 um; prepreg 0.2 mm er 4.2; copper IN 18 um; prepreg 0.2 mm er 4.2; plane B 18 um }\n';
    assert.deepEqual(picked(`${buried}${open}net Q { }\nrun r on IN for 20 mm { trace V 0.1 mm; gap 1 mm; trace Q 0.1 mm }\nambient radio { field 10 V/m from 30 MHz to 30 MHz }`), []);
  });

  it('is filtered by the band, and listed with what it was before', () => {
    const text = (measure: string) => `net V { source 50 ohm; load 50 ohm; tolerates 1 V ${measure}; band 1 kHz to 1 MHz }\nloop in { senses V; rectangle 10 mm by 10 mm; wire 0.5 mm }\nambient radio { field 10 V/m from 80 MHz to 80 MHz }`;
    const [peak] = picked(text('peak'));
    near(peak.value / peak.unfiltered!, 1 / Math.hypot(1, 80), 1e-3);
    const [rms] = picked(text('rms'), 'V', 'rms');
    assert.equal(rms.value, 0);
    near(rms.unfiltered!, peak.unfiltered! / Math.SQRT2, 1e-6);
    assert.ok(evaluated(text('peak')).limits.some(({ message }) => message.includes('semiconductor junctions rectify')));
  });

  it('lifts the mean of a pair far more than its difference', () => {
    const text = `${microstrip}net P { source 50 ohm; load 50 ohm }\nnet N { source 50 ohm; load 50 ohm }\npair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak }\nrun r on TOP for 40 mm { trace P 0.2 mm; gap 0.2 mm; trace N 0.2 mm }\nambient radio { field 10 V/m from 100 MHz to 100 MHz }`;
    const [difference, mean] = evaluated(text).budgets.map(({ contributions }) => contributions.find(({ channel }) => channel === 'radiated')?.value ?? 0);
    assert.ok(0 < mean && difference < 0.2 * mean, `${difference} and ${mean}`);
  });

  it('is one cause, wherever it gets in, and unrelated to others', () => {
    const text = `board b { combine rss }\n${open}loop one { senses V; rectangle 10 mm by 10 mm }\nloop two { senses V; rectangle 10 mm by 10 mm at (50 mm, 0 mm) }\nambient radio { field 1 V/m from 80 MHz to 80 MHz }\nambient talk { field 1 V/m from 80 MHz to 80 MHz }`;
    const found = picked(text);
    near(budgetOf(evaluated(text), 'V').total!, Math.hypot(found[0].value * 2, found[0].value * 2), 1e-3);
  });
});
