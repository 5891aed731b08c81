/**
 * What our own client and server say to each other besides the protocol. The client imports this file
 * and nothing else of the server; a client that knows none of it gets everything but virtual files.
 */

/** The client's half of `initializationOptions`; every key may be missing. */
export interface ClientOptions {
  /** It answers `readFile` and `listFiles`, so that files of any scheme can be read. */
  readonly readsFiles?: boolean;
  /** It opens `<rulePages>:/<rule>.md`, for the link from a finding to the page of its rule. */
  readonly rulePages?: string;
  /** It shows `status` notifications. */
  readonly showsStatus?: boolean;
  /** It shows SVG images in the Markdown of a hover, from `data:` addresses. */
  readonly showsPictures?: boolean;
  /** Its command that shows several places at once, called with `ShowPlacesArguments`: for code lenses. */
  readonly showPlaces?: string;
}

interface Point {
  readonly line: number;
  readonly character: number;
}

/** The document and the point that it is shown at, and the places. */
export type ShowPlacesArguments = readonly [uri: string, at: Point, places: readonly { readonly uri: string; readonly range: { readonly start: Point; readonly end: Point } }[]];

/** Server to client. */
export const readFileMethod = 'quietrun/readFile';

export interface ReadFileParams {
  readonly uri: string;
  /** Folders that the file has to lie in, symbolic links followed; it lies in one of them by its name. */
  readonly inside: readonly string[];
}

export type ReadFileAnswer =
  | { readonly text: string }
  | { readonly problem: 'missing' | 'outside' | 'case' | 'too-large' | 'unreadable' | 'unread'; /** As the file system spells it. */ readonly spelling?: string };

/** Server to client, no parameters: the board files of the workspace. */
export const listFilesMethod = 'quietrun/listFiles';

export interface ListFilesAnswer {
  readonly uris: readonly string[];
}

/** Client to server: the page of a rule, Markdown; null where there is no such rule. */
export const explainMethod = 'quietrun/explain';

export interface ExplainParams {
  readonly rule: string;
}

/**
 * Client to server: what the margins of a file's boards have become since another revision, which only the client can reach. It hands
 * over the files of that revision that it has so far, and is told which are lacking, until there is an answer.
 */
export const compareMethod = 'quietrun/compare';

export interface CompareParams {
  /** A file of the new revision, as it stands in the editor. */
  readonly uri: string;
  /** What people call it. */
  readonly name: string;
  readonly before: {
    /** The file that it is compared with; null for the same files as they were, for each board that uses this one. */
    readonly root: string | null;
    /** What people call that file; without one, that revision. */
    readonly name: string;
    readonly files: readonly { readonly uri: string; readonly answer: ReadFileAnswer }[];
  };
}

export type CompareAnswer =
  | { readonly missing: readonly ReadFileParams[] }
  /** A whole document. */
  | { readonly markdown: string }
  /** Why there is nothing to compare: one sentence. */
  | { readonly refused: string };

/** Server to client, after the findings of a file changed. */
export const statusMethod = 'quietrun/status';

export interface StatusParams {
  readonly uri: string;
  /** The receiver with the smallest margin in the projects of this file; null where there is none. */
  readonly worst: { readonly receiver: string; readonly marginDb: number } | null;
  /** Budgets that could not be computed whole. */
  readonly incomplete: number;
}

/** Files larger than this are not read; shared by every reader. */
export const largestFile = 8 * 1024 * 1024;
