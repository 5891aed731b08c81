/** A name as it has to be written: quoted where a bare word would not be read as that name. */
import { isTypographicQuote, isWordCharacter } from './characters';
import { looksLikeRange } from './names';

export function writtenName(name: string): string {
  return isBare(name) ? name : `"${name.replaceAll('"', '""')}"`;
}

function isBare(name: string): boolean {
  if (name.startsWith('#') || isTypographicQuote(name.charCodeAt(0)) || !/[\p{L}\p{N}]/u.test(name)) return false;
  for (let at = 0; at < name.length; at += 1) if (!isWordCharacter(name.charCodeAt(at))) return false;
  return !looksLikeRange(name);
}
