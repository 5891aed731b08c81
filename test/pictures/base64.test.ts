/** The node host's own encoder is the reference; the examples are those of RFC 4648, section 10. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import fc from 'fast-check';
import { base64 } from '../../server/src/pictures/base64';

describe('base64', () => {
  it('is that of the standard', () => {
    for (const [text, encoded] of [['', ''], ['f', 'Zg=='], ['fo', 'Zm8='], ['foo', 'Zm9v'], ['foobar', 'Zm9vYmFy']] as const) assert.equal(base64(text), encoded);
  });
  it('is that of the host, for any text', () => fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => assert.equal(base64(text), Buffer.from(text, 'utf8').toString('base64')))));
  it('has a character for half of a surrogate pair', () => assert.equal(base64('a\ud800b'), Buffer.from('a\ufffdb').toString('base64')));
});
