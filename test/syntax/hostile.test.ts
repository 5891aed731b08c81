/** Texts that no person writes: each is read in linear time and answered by few, clear errors. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { parse } from '../../server/src/syntax/parse';
import { seeded } from '../support/seeded';

/** Two hundred and the one that says that more follow. */
const mostErrors = 201;
/** Ten to a hundred times what these take: only a cost that grows faster than the text goes over it, even on a busy machine. */
const milliseconds = 10_000;
const megabyte = 1_000_000;

const texts: Readonly<Record<string, () => string>> = {
  'nested braces': () => '{'.repeat(100_000),
  'nested braces in a block': () => `net A {${'{'.repeat(100_000)}`,
  'nested declarations on one line': () => 'run r for 1 mm { on A { '.repeat(50_000),
  'nested declarations on lines of their own': () => 'net A {\n'.repeat(100_000),
  'closing braces': () => '}'.repeat(megabyte),
  'opening parentheses': () => `loop l { path ${'('.repeat(megabyte)}`,
  'points without end': () => `loop l { path ${'(1 mm, 2 mm) '.repeat(80_000)}`,
  'one word': () => 'a'.repeat(megabyte),
  'one name': () => `net ${'a'.repeat(megabyte)} { once }`,
  'one number': () => `net A { rise ${'1'.repeat(megabyte)} ns }`,
  'one unit': () => `net A { rise 1 ${'n'.repeat(megabyte)} }`,
  'one string': () => `use "${'a'.repeat(megabyte)}"`,
  'one string that is not closed': () => `use "${'""'.repeat(megabyte / 2)}`,
  'one comment': () => `#${'#'.repeat(megabyte)}`,
  'a line of statements': () => `net A { ${'rise 40 ns; '.repeat(90_000)}}`,
  'a line of units that are missing': () => `net A { ${'rise 40; '.repeat(110_000)}}`,
  'a line of words': () => `net A { ${'rise '.repeat(200_000)}}`,
  'a line of suffixes': () => `run r on A for 1 mm { trace A 1 mm ${'reversed '.repeat(100_000)}}`,
  'a line of unknown suffixes': () => `run r on A for 1 mm { trace A 1 mm ${'nothing '.repeat(100_000)}}`,
  'a line of quantities': () => `net A { rise ${'40 ns '.repeat(150_000)}}`,
  'thousands separators': () => `net A { rise ${'1,000'.repeat(200_000)} ns }`,
  'groups of thousands': () => `net A { rise 1${' 000'.repeat(250_000)} ns }`,
  'typographic quotes': () => `use ${'\u201c'.repeat(megabyte)}`,
  'a plus-minus after another': () => `net A { rise 40 ns ${'± '.repeat(500_000)}}`,
  'commas at line ends': () => `net A { load 1 ohm${',\n'.repeat(500_000)}}`,
  'returns without a block': () => `run r on A for 1 mm {${'\nreturn x'.repeat(100_000)}\n}`,
  'blank lines after heads': () => `net A${'\n'.repeat(megabyte)}net B${'\n'.repeat(megabyte)}`,
  'documentation': () => `${'## text\n'.repeat(120_000)}net A { once }`,
  'a range without an end': () => `net D[${'0'.repeat(megabyte)}..1 { once }`,
  'brackets': () => `net ${'[0..1]'.repeat(160_000)} { once }`,
  'semicolons': () => ';'.repeat(megabyte),
  'tabs': () => '\t'.repeat(megabyte),
  'carriage returns': () => '\r'.repeat(megabyte),
  'random characters of the language': () => randomText(7, 'net run{}();,"#\n 0.1mm±[..]-'),
  'random bytes': () => {
    const random = seeded(11);
    return new TextDecoder().decode(Uint8Array.from({ length: megabyte }, () => Math.floor(random() * 256)));
  },
};

describe('hostile texts', () => {
  for (const [name, text] of Object.entries(texts)) {
    it(name, () => {
      const made = text();
      const start = performance.now();
      const tree = parse(made);
      assert.ok(performance.now() - start < milliseconds);
      assert.ok(tree.errors.length <= mostErrors, `${tree.errors.length} errors`);
      for (const { message } of tree.errors) assert.ok(message.length < 400);
    });
  }

  it('says that more mistakes follow', () => {
    const { errors } = parse(`net A {\n${'rise 40\n'.repeat(1000)}}`);
    assert.equal(errors.length, mostErrors);
    assert.equal(errors.at(-1)?.message, 'more mistakes follow; the first 200 are shown');
  });

  it('quotes what was found without control characters, and not at length', () => {
    const [error] = parse(`net A { rise 1 \u001b[31m\u202e\`${'x'.repeat(500)} }`).errors;
    assert.match(error!.message, /^no unit `\ufffd\[31m\ufffd'x{1,40}…`/);
  });
});

function randomText(seed: number, characters: string): string {
  const random = seeded(seed);
  return Array.from({ length: megabyte }, () => characters[Math.floor(random() * characters.length)]).join('');
}
