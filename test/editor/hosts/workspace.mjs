/** A fresh copy of the files that the tests open, with the line ends that are asked for. */
import { cpSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';

export function freshWorkspace({ from, lineEnds }) {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'quietrun-boards-'));
  for (const source of from) cpSync(source, folder, { recursive: true });
  for (const file of readdirSync(folder, { recursive: true, encoding: 'utf8' })) {
    if (!file.endsWith('.quiet')) continue;
    const full = path.join(folder, file);
    const text = readFileSync(full, 'utf8').replace(/\r\n/g, '\n');
    writeFileSync(full, lineEnds === 'crlf' ? text.replace(/\n/g, '\r\n') : text);
  }
  return { folder, remove: () => rmSync(folder, { recursive: true, force: true }) };
}
