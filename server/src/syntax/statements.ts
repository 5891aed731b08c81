/**
 * Every statement of the language, block by block: the data that `grammar.ts` describes.
 *
 * Two statements begin with the same word in a run (`return NAME {` at top level, `return NAME
 * QUANTITY` in a row): the parser tells them apart by what follows the name.
 */
import type { Dimension } from '../units/dimension';
import { exampleOf } from '../units/spelling';
import type { BlockKind, NameKind, Part, StatementShape } from './grammar';

const quantity = (role: string, dimension: Dimension, example = exampleOf(dimension)): Part => ({ is: 'quantity', role, dimension, toleranced: dimension !== 'temperature' && dimension !== 'level', copper: false, example });
const copperThickness: Part = { is: 'quantity', role: 'thickness', dimension: 'length', toleranced: true, copper: true, example: '35 um' };
const declared = (of: NameKind, many = false): Part => ({ is: 'name', role: 'name', of, declares: true, many });
const name = (role: string, of: NameKind, many = false): Part => ({ is: 'name', role, of, declares: false, many });
const word = (role: string, ...words: string[]): Part => ({ is: 'word', role, words });
const keyword = (...words: string[]): Part[] => words.map((text) => ({ is: 'keyword', word: text }));
const optional = (...parts: Part[]): Part => ({ is: 'optional', parts });
const suffixes = (...of: Part[][]): Part => ({ is: 'suffixes', of, needs: null });
const choice = (...of: Part[][]): Part => ({ is: 'choice', of });
const comma: Part = { is: 'comma' };

const once = (word_: string, parts: Part[], about: string): StatementShape => ({ keyword: word_, parts, repeats: false, about });
const many = (word_: string, parts: Part[], about: string): StatementShape => ({ keyword: word_, parts, repeats: true, about });
const opens = (kind: BlockKind, shape: StatementShape, required: 'always' | 'unless-is' = 'always'): StatementShape => ({ ...shape, block: { kind, required } });

const isFamily = optional(...keyword('is'), name('family', 'family'));
const frequencies = [...keyword('at'), quantity('frequency', 'frequency', '1 MHz'), optional(...keyword('to'), quantity('upper', 'frequency', '30 MHz'))];
const ends = (ohms: string, farads: string) => choice(
  [quantity('resistance', 'resistance', ohms), optional(comma, quantity('capacitance', 'capacitance', farads))],
  [quantity('capacitance', 'capacitance', farads), optional(comma, quantity('resistance', 'resistance', ohms))],
);
const rampOrSine = choice([...keyword('rise'), quantity('rise', 'time', '60 ns')], [word('measure', 'rms', 'peak'), ...frequencies]);
const limit = (role: string, dimension: Dimension, example: string) => [...keyword('at', 'most'), quantity(role, dimension, example)];
const at = optional(...keyword('at'), { is: 'point', role: 'at' });

const waiveHere = many('waive', [{ is: 'rule-name', role: 'rule' }, ...keyword('because'), { is: 'string', role: 'reason' }], 'Keeps a finding of this rule, shown as waived with its reason.');

const net: readonly StatementShape[] = [
  once('swing', [quantity('swing', 'voltage'), optional(...keyword('to'), quantity('to', 'voltage', '24 V'))], 'What the unloaded driver moves through: an amplitude, or from one level to another.'),
  once('rise', [quantity('rise', 'time')], 'Rise time of the unloaded driver, from 10 % to 90 %.'),
  once('fall', [quantity('fall', 'time')], 'Fall time of the unloaded driver, from 90 % to 10 %; the same as `rise` where it is not stated.'),
  once('source', [ends('33 ohm', '10 pF')], 'Impedance of the driving end: a resistance, a capacitance, or both in parallel. A series resistor at the driver is part of it.'),
  once('load', [ends('10 kohm', '10 pF')], 'Impedance of the receiving end: a resistance, a capacitance, or both in parallel.'),
  once('sine', [quantity('sine', 'voltage', '1 V'), word('measure', 'rms', 'peak'), ...frequencies], 'A sine that the driver carries, at one frequency or over a range of which the worst counts.'),
  once('current', [quantity('current', 'current', '1.8 A'), optional(rampOrSine)], 'A current that the net draws at its load end, in step with the voltage.'),
  once('repeats', [quantity('repeats', 'frequency', '100 kHz'), optional(...keyword('duty'), quantity('duty', 'fraction', '30 %'))], 'Whole cycles a second, one rise and one fall each; duty defaults to 50 %.'),
  once('once', [], 'The edge does not repeat.'),
  once('both', keyword('ways'), 'The net is driven from either end in turn: every direction is computed, the worst counts.'),
  once('switches', [...keyword('with'), name('group', 'group')], 'Nets of one group switch at the same moment.'),
  once('working', [quantity('working', 'voltage', '48 V'), word('measure', 'dc', 'rms', 'peak')], 'Working voltage, where people or insulation depend on it.'),
  many('tolerates', [choice([quantity('tolerates', 'voltage', '2 mV'), word('measure', 'peak', 'rms')], [word('none', 'none')])], 'How much noise the receiver takes: zero to peak, or rms over its band. One of each is allowed.'),
  once('band', [quantity('from', 'frequency', '10 kHz'), ...keyword('to'), quantity('to', 'frequency', '4 MHz')], 'The band in which the receiver listens.'),
  once('noise', [quantity('voltage', 'voltage-noise'), optional(comma, quantity('current', 'current-noise')), optional(...keyword('corner'), quantity('corner', 'frequency', '2 kHz'))], 'Input noise of what the receiver listens through.'),
  once('contact', [quantity('index', 'level', '-20 dB'), ...keyword('at'), quantity('across', 'voltage', '5 V')], 'Noise index of its resistors (IEC 60195) and the dc voltage across them.'),
  once('samples', [quantity('delay', 'time', '2 us'), ...keyword('after'), name('group', 'group')], 'Of that group, only what is left this long after its edge counts.'),
  once('length', [quantity('length', 'length', '60 mm')], 'The whole routed length of the net.'),
  waiveHere,
];

const row: readonly StatementShape[] = [
  many('trace', [name('net', 'net', true), quantity('width', 'length'), suffixes([word('reversed', 'reversed')], [...keyword('after'), quantity('after', 'length', '12 mm')], [...keyword('spaced'), quantity('spaced', 'length', '0.15 mm')])], 'A conductor of the row that carries a net, and its width.'),
  many('guard', [name('net', 'free'), quantity('width', 'length'), suffixes([...keyword('stitched'), quantity('stitched', 'length', '4 mm')])], 'A conductor tied to the reference at both ends, and between them where it is stitched.'),
  many('return', [name('net', 'free'), quantity('width', 'length', '2 mm')], 'A conductor of the row that carries the return current.'),
  many('gap', [quantity('gap', 'length', '0.3 mm')], 'The distance between two neighbouring conductors, edge to edge.'),
];

export const statementShapes: Readonly<Record<BlockKind, readonly StatementShape[]>> = {
  file: [
    many('use', [{ is: 'string', role: 'path' }], 'Takes everything that another file declares into this project.'),
    opens('board', once('board', [declared('board')], 'The board: its temperature, its clearance, how its budgets are made up.')),
    opens('stackup', many('stackup', [optional(declared('stackup'))], 'The layers of a board, from top to bottom.')),
    opens('net', many('family', [declared('family'), isFamily], 'Properties that several nets share.'), 'unless-is'),
    opens('net', many('net', [declared('net', true), isFamily], 'A net: a source of noise, a receiver, or both.'), 'unless-is'),
    opens('pair', many('pair', [declared('pair'), isFamily], 'Two nets that carry one signal as a difference.'), 'unless-is'),
    opens('run', many('run', [declared('run'), { is: 'suffixes', of: [[...keyword('on'), name('layer', 'copper')], [...keyword('for'), quantity('length', 'length', '38 mm')]], needs: 'for' }], 'Conductors that lie beside each other for a length, written as the cross-section reads from left to right.')),
    opens('loop', many('loop', [declared('loop'), optional(...keyword('on'), name('layer', 'copper'))], 'A closed path of current.')),
    opens('return', many('return', [declared('return')], 'A piece of conductor that several currents share on their way back.')),
    opens('link', many('link', [declared('link')], 'Coupling that no cross-section describes: a connector, a relay, a transformer.')),
    opens('shield', many('shield', [declared('shield')], 'A metal cover over nets and loops.')),
    opens('ambient', many('ambient', [declared('ambient')], 'A radio field that the board has to live in.')),
    many('waive', [{ is: 'rule-name', role: 'rule' }, ...keyword('on'), name('subject', 'any'), ...keyword('because'), { is: 'string', role: 'reason' }], 'Keeps a finding of this rule on this subject, shown as waived with its reason.'),
  ],
  board: [
    once('temperature', [quantity('temperature', 'temperature', '55 degC')], 'Temperature of the board; 25 °C where it is not stated.'),
    once('headroom', [quantity('headroom', 'level')], 'Wanted between a total and what is tolerated; 0 dB where it is not stated.'),
    once('combine', [word('combine', 'worst', 'rss')], 'How peaks of unrelated sources add: `worst` their magnitudes, `rss` their squares.'),
    once('clearance', [quantity('clearance', 'length', '0.15 mm')], 'The smallest gap that the fabricator makes; 0.1 mm where it is not stated.'),
    many('emits', [...limit('field', 'field', '40 dBuV/m'), ...keyword('at'), quantity('distance', 'length', '3 m'), ...keyword('from'), quantity('from', 'frequency', '30 MHz'), ...keyword('to'), quantity('to', 'frequency', '88 MHz')], 'A limit line for the field that a loop emits.'),
    waiveHere,
  ],
  stackup: [
    many('mask', [quantity('thickness', 'length', '25 um'), suffixes([...keyword('er'), quantity('er', 'number', '3.4')], [...keyword('loss'), quantity('loss', 'number', '0.02')], [word('flat', 'flat')])], 'Solder mask that follows the copper; `flat`: planar, its thickness above the top of the copper.'),
    ...(['dielectric', 'core', 'prepreg'] as const).map((material) =>
      many(material, [quantity('thickness', 'length'), suffixes([...keyword('er'), quantity('er', 'number')], [...keyword('loss'), quantity('loss', 'number', '0.02')])], 'An insulating row: its thickness after pressing and its relative permittivity.')),
    many('copper', [declared('copper'), copperThickness, suffixes([...keyword('undercut'), quantity('undercut', 'length', '8 um')])], 'A signal layer and its finished thickness. `undercut`: how much narrower, on each side, the top of a trace is than its foot.'),
    many('plane', [declared('plane'), copperThickness], 'A reference conductor of zero potential.'),
  ],
  net,
  pair: [
    once('plus', [name('net', 'net')], 'The net that carries the signal.'),
    once('minus', [name('net', 'net')], 'The net that carries its complement.'),
    once('across', [ends('100 ohm', '2 pF')], 'What lies between the two receiving ends, besides each net’s own load.'),
    many('common', [...keyword('tolerates'), quantity('tolerates', 'voltage', '0.5 V'), word('measure', 'peak', 'rms')], 'How much noise the mean of the two nets may carry.'),
    once('rejects', [quantity('rejects', 'level', '80 dB')], 'How far the receiver suppresses the mean of the two nets.'),
    ...net,
  ],
  row: [
    ...row,
    once('shift', [quantity('shift', 'length', '0.1 mm')], 'Left edge of this row, from the left edge of the first row; may be negative.'),
  ],
  run: [
    ...row,
    opens('row', many('on', [name('layer', 'copper')], 'The conductors of this run on one layer.')),
    many('without', [name('plane', 'plane')], 'That plane is cut away here.'),
    waiveHere,
  ],
  loop: [
    many('carries', [name('net', 'net'), optional(quantity('current', 'current', '1.8 A'), optional(rampOrSine))], 'The net whose current flows in the loop; current and rise default to the net’s.'),
    many('senses', [name('net', 'any')], 'The net in which the voltage induced in the loop appears.'),
    once('rectangle', [quantity('width', 'length', '22 mm'), ...keyword('by'), quantity('height', 'length', '9 mm'), at], 'A rectangle, along x by along y, with the corner of smallest x and y.'),
    once('circle', [quantity('diameter', 'length', '9 mm'), at], 'A circle by its diameter and centre.'),
    once('path', [{ is: 'repeat', parts: [{ is: 'optional-comma' }, { is: 'point', role: 'point' }] }], 'A closed polygon by its corners.'),
    once('trace', [quantity('length', 'length', '30 mm'), ...keyword('above'), name('plane', 'plane'), at], 'Out along x on the loop’s layer, back in the plane.'),
    once('strip', [quantity('strip', 'length', '1 mm')], 'The conductor is a flat strip of this width.'),
    once('wire', [quantity('wire', 'length', '0.5 mm')], 'The conductor is a round wire of this diameter.'),
    many('over', [name('plane', 'plane')], 'The image of the loop in that plane counts.'),
    many('turned', [quantity('angle', 'angle'), ...keyword('about'), word('axis', 'x', 'y', 'z')], 'Turns the loop about the centre of its shape.'),
    once('area', limit('area', 'area', '120 mm2'), 'A limit for the area that the loop encloses.'),
    once('inductance', limit('inductance', 'inductance', '25 nH'), 'A limit for the loop’s inductance.'),
    waiveHere,
  ],
  return: [
    many('strip', [quantity('length', 'length', '30 mm'), ...keyword('by'), quantity('width', 'length', '1.5 mm'), ...keyword('on'), name('layer', 'copper')], 'A flat piece of copper, length by width.'),
    once('over', [name('plane', 'plane')], 'The return lies above that plane.'),
    many('via', [optional({ is: 'count', role: 'count' }), suffixes([...keyword('drill'), quantity('drill', 'length', '0.3 mm')], [...keyword('length'), quantity('length', 'length', '1.6 mm')])], 'Vias in parallel; one where no count is stated.'),
    many('measured', [quantity('resistance', 'resistance', '2 mohm'), optional(comma, quantity('inductance', 'inductance', '1.2 nH'))], 'A value from the bench.'),
    many('carries', [name('net', 'net', true)], 'A net whose current returns through this piece.'),
    many('refers', [name('net', 'any', true)], 'A net whose receiver measures against the far end of this piece.'),
    waiveHere,
  ],
  link: [
    once('between', [name('from', 'net'), ...keyword('and'), name('to', 'net')], 'The two nets that the link couples, at their load ends.'),
    once('capacitance', [quantity('capacitance', 'capacitance', '0.8 pF')], 'Capacitance between the two nets.'),
    once('mutual', [quantity('mutual', 'inductance', '3 nH')], 'Mutual inductance between the two nets.'),
    waiveHere,
  ],
  shield: [
    many('covers', [name('subject', 'any', true)], 'A net, pair or loop under the shield.'),
    once('sheet', [word('material', 'copper', 'aluminium', 'brass', 'tin', 'steel', 'nickel-silver'), quantity('thickness', 'length', '0.5 mm')], 'What the shield is made of, and how thick.'),
    once('slot', [quantity('slot', 'length', '6 mm')], 'The longest opening of the shield.'),
    once('grounded', [], 'The shield is tied to the reference.'),
    once('floating', [], 'The shield is tied to nothing.'),
    waiveHere,
  ],
  ambient: [
    once('field', [quantity('field', 'field', '10 V/m'), ...keyword('from'), quantity('from', 'frequency', '80 MHz'), ...keyword('to'), quantity('to', 'frequency', '1 GHz'), optional(...keyword('modulated'), quantity('modulated', 'fraction', '80 %'))], 'A radio field: rms of the unmodulated field, as test levels are stated.'),
    waiveHere,
  ],
};
