/** Standard input, whole. */
import { fstatSync } from 'node:fs';

export async function readStandardInput(): Promise<Uint8Array> {
  // Node takes a folder there for nothing at all, and nothing has no findings.
  if (process.platform !== 'win32' && fstatSync(0).isDirectory()) throw new Error('it is a folder');
  const chunks: Buffer[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}
