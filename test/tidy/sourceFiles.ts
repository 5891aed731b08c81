import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs';

export interface SourceFile {
  readonly file: string;
  readonly text: string;
}

/** All files below a folder with one of the endings, `/` in their paths. */
export function sourceFiles(folder: string, endings: readonly string[] = ['.ts']): readonly SourceFile[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder).flatMap((entry) => {
    const file = `${folder}/${entry}`;
    if (passedOver.has(entry) || entry.startsWith('.')) return [];
    if (statSync(file).isDirectory()) return sourceFiles(file, endings);
    return endings.some((ending) => file.endsWith(ending)) ? [{ file, text: readFileSync(file, 'utf8') }] : [];
  });
}

/** Not ours, or made; so is whatever begins with a dot. */
const passedOver: ReadonlySet<string> = new Set(['node_modules', 'dist', 'package-lock.json']);
