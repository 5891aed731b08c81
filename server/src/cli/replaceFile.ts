/** Puts a text in the place of a file, whole or not at all: with its rights kept, and behind a link rather than over it. */
import { randomUUID } from 'node:crypto';
import { chmod, chown, realpath, rename, rm, stat, writeFile } from 'node:fs/promises';

/** Null when it is done, else why not. */
export async function replaceFile(file: string, text: string): Promise<string | null> {
  let draft: string | null = null;
  try {
    const real = await realpath(file);
    const { mode, uid, gid } = await stat(real);
    // A file that may not be written is not replaced either, though its folder would allow it.
    if ((mode & 0o222) === 0) return 'it is read-only';
    // Beside it, so that the change of names happens at once.
    draft = `${real}.${randomUUID()}.tmp`;
    await writeFile(draft, text, { flag: 'wx', mode });
    await chmod(draft, mode);
    // Only the owner of all files may give them away; to everyone else the file is their own already.
    await chown(draft, uid, gid).catch(() => undefined);
    await rename(draft, real);
    return null;
  } catch (error) {
    if (draft !== null) await rm(draft, { force: true }).catch(() => undefined);
    return (error as NodeJS.ErrnoException).code ?? String(error);
  }
}
