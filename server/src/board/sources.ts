/**
 * Where a project's files come from. `board` reads no disk: whoever owns the files answers by key, and
 * says why it cannot. Keys are opaque but for `/`, by which a `use` is joined to its file's folder.
 */
import type { SourceTree } from '../syntax/tree';

export interface Sources {
  read(path: string): SourceAnswer;
}

export type SourceAnswer = { readonly tree: SourceTree } | SourceProblem;

export interface SourceProblem {
  /**
   * missing    there is no such file
   * outside    it is not inside the workspace folder
   * case       the file's name differs from the path in case
   * too-large  over 8 MiB
   * unreadable it is a folder or a device, or may not be read
   * unread     it has been asked for and has not arrived: no finding, but the project is incomplete
   */
  readonly problem: 'missing' | 'outside' | 'case' | 'too-large' | 'unreadable' | 'unread';
  /** With `case`: the path as the file system spells it, from whatever folder. */
  readonly actual?: string;
}

/** Limits that keep a hostile or mistaken `use` from costing more than a project can need. */
export const sourceLimits = { depth: 16, files: 1000, bytes: 8 * 1024 * 1024 } as const;
