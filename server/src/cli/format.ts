/**
 * `quietrun format`: sets files in order, or says which are not. All are read before the first is written, each is written
 * whole or not at all, and one that is in order already is not written.
 */
import { readFile, stat } from 'node:fs/promises';
import path from 'node:path';
import { largestFile } from '../disk/usedFile';
import { formattedText, type FormattedText } from '../service/formattedText';
import type { FormatCommand } from './arguments';
import { counted, printableWord } from './printable';
import { replaceFile } from './replaceFile';
import type { Surroundings, status } from './run';

type Outcome = keyof typeof status;

interface NamedText {
  /** As it was named. */
  readonly file: string;
  readonly text: string;
  readonly made: FormattedText;
}

export async function format({ files, check }: FormatCommand, around: Surroundings): Promise<Outcome> {
  const read = await readAll(files, around);
  if ('refused' in read) {
    around.complain(`quietrun: ${printableWord(read.refused)}\n`);
    return 'notRun';
  }
  const code = check ? checked(read.read, around) : await written(read.read, around);
  for (const { file, made } of read.read) {
    if (0 < made.kept.length) around.complain(`quietrun: ${counted(made.kept.length, 'line')} of ${printableWord(nameOf(file))} cannot be read and ${made.kept.length === 1 ? 'stays as it is: line' : 'stay as they are: lines'} ${shortened(made.kept)}\n`);
  }
  return code;
}

function checked(all: readonly NamedText[], { write }: Surroundings): Outcome {
  const untidy = all.filter(({ made }) => 0 < made.changed.length);
  for (const { file, made } of untidy) write(`${printableWord(nameOf(file))}:${made.changed[0]}: ${counted(made.changed.length, 'line')} not formatted\n`);
  write(untidy.length === 0 ? `${counted(all.length, 'file')} formatted already.\n` : `${untidy.length} of ${counted(all.length, 'file')} not formatted; quietrun format without --check sets ${untidy.length === 1 ? 'it' : 'them'} in order.\n`);
  return untidy.length === 0 ? 'clean' : 'findings';
}

async function written(all: readonly NamedText[], { workingDirectory, write, complain }: Surroundings): Promise<Outcome> {
  let code: Outcome = 'clean';
  for (const { file, made } of all) {
    if (file === '-') {
      write(made.text);
      continue;
    }
    const problem = made.changed.length === 0 ? null : await replaceFile(path.resolve(workingDirectory, file), made.text);
    if (problem !== null) {
      complain(`quietrun: ${printableWord(file)} cannot be written (${problem}): it stays as it is\n`);
      code = 'notRun';
    } else {
      // Where text goes to standard output, nothing else may.
      const say = all.some((each) => each.file === '-') ? complain : write;
      say(`${printableWord(file)}: ${made.changed.length === 0 ? 'formatted already' : `${counted(made.changed.length, 'line')} formatted`}\n`);
    }
  }
  return code;
}

/** A file that is named twice is read once. */
async function readAll(files: readonly string[], around: Surroundings): Promise<{ readonly read: readonly NamedText[] } | { readonly refused: string }> {
  const byPath = new Map(files.map((file) => [file === '-' ? '-' : path.resolve(around.workingDirectory, file), file]));
  const read: NamedText[] = [];
  for (const [full, file] of byPath) {
    const bytes = file === '-' ? await standardInput(around) : await bytesOf(full);
    if ('why' in bytes) return { refused: `${nameOf(file)} ${bytes.why}` };
    const text = decoded(bytes);
    // What is no UTF-8 would be written back as something else.
    if (text === null) return { refused: `${nameOf(file)} is not UTF-8: it stays as it is` };
    read.push({ file, text, made: formattedText(text) });
  }
  return { read };
}

const nameOf = (file: string) => (file === '-' ? 'standard input' : file);

async function bytesOf(full: string): Promise<Uint8Array | { readonly why: string }> {
  try {
    const found = await stat(full);
    if (!found.isFile()) return { why: 'is not a file' };
    return largestFile < found.size ? { why: 'is over 8 MiB' } : await readFile(full);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    return { why: code === 'ENOENT' ? 'is not there' : `cannot be read (${code ?? String(error)})` };
  }
}

async function standardInput({ readStandardInput }: Surroundings): Promise<Uint8Array | { readonly why: string }> {
  try {
    const bytes = await readStandardInput();
    return largestFile < bytes.length ? { why: 'is over 8 MiB' } : bytes;
  } catch (error) {
    return { why: `cannot be read (${error instanceof Error ? error.message : String(error)})` };
  }
}

/** With its byte-order mark; null where the bytes are no text. */
function decoded(bytes: Uint8Array): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes);
  } catch {
    return null;
  }
}

function shortened(lines: readonly number[]): string {
  return lines.length <= 5 ? lines.join(', ') : `${lines.slice(0, 4).join(', ')} …`;
}
