/** Base64 (RFC 4648, section 4) of a text in UTF-8, without what only one kind of host has. */
export function base64(text: string): string {
  const bytes = utf8(text);
  const parts: string[] = [];
  for (let at = 0; at < bytes.length; at += 3) {
    const [first, second, third] = [bytes[at], bytes[at + 1], bytes[at + 2]];
    const word = (first << 16) | ((second ?? 0) << 8) | (third ?? 0);
    parts.push(digits[word >> 18], digits[(word >> 12) & 63], second === undefined ? '=' : digits[(word >> 6) & 63], third === undefined ? '=' : digits[word & 63]);
  }
  return parts.join('');
}

const digits = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Half of a surrogate pair is no character: it becomes the one that stands for such. */
function utf8(text: string): readonly number[] {
  const bytes: number[] = [];
  for (const character of text) {
    const given = character.codePointAt(0) as number;
    const code = 0xd800 <= given && given <= 0xdfff ? 0xfffd : given;
    if (code < 0x80) bytes.push(code);
    else if (code < 0x800) bytes.push(0xc0 | (code >> 6), 0x80 | (code & 63));
    else if (code < 0x10000) bytes.push(0xe0 | (code >> 12), 0x80 | ((code >> 6) & 63), 0x80 | (code & 63));
    else bytes.push(0xf0 | (code >> 18), 0x80 | ((code >> 12) & 63), 0x80 | ((code >> 6) & 63), 0x80 | (code & 63));
  }
  return bytes;
}
