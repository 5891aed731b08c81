import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { closest } from '../../server/src/syntax/words';
import { writtenName } from '../../server/src/syntax/writtenName';
import { parse } from '../../server/src/syntax/parse';

describe('the word that was meant', () => {
  const meant: readonly (readonly [string, readonly string[], string | null])[] = [
    ['TPO', ['BOTTOM', 'TOP'], 'TOP'], // two letters exchanged
    ['revrsed', ['after', 'reversed', 'spaced'], 'reversed'], // one left out
    ['gapp', ['guard', 'gap'], 'gap'], // one too many
    ['tracd', ['trace'], 'trace'], // one for another
    ['NET', ['net', 'NEXT'], 'net'], // the case alone is nearer than a letter
    ['top', ['TIP', 'TOP'], 'TOP'],
    ['GND2', ['GND1', 'PWR'], 'GND1'],
    ['A', ['B', 'C'], null], // every name of one letter is one letter from every other
    ['ab', ['cd'], null],
    ['voltage', ['swing', 'sine'], null],
    ['A', ['A'], null], // itself is no suggestion
    ['x'.repeat(65), ['x'.repeat(64)], null], // longer than anything that a person misspells
    ['', ['a'], 'a'],
  ];
  for (const [word, candidates, expected] of meant) it(`${word.slice(0, 12)} among ${candidates.join(', ').slice(0, 30)}`, () => assert.equal(closest(word, candidates), expected));
});

describe('a name as it is written', () => {
  for (const name of ['A', '3V3', 'RESET#', '#1', 'A B', 'a"b', '{', '--', 'D[0..3]', 'D[0]', 'a[b..', '\u201cA', '', 'µ', 'a\u00a0b']) {
    it(`${JSON.stringify(name)} is read back`, () => {
      const [statement] = parse(`net ${writtenName(name)} { once }`).statements;
      if (name === '') return;
      const [value] = statement!.values;
      assert.ok(value?.kind === 'name' && value.name === name && value.range === null);
    });
  }
});
