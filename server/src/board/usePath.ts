/**
 * The key of the file that a `use` names: its path joined, as text, to the folder of the file it stands
 * in. Climbing above the top of a key is refused here; whether a file that does exist lies inside the
 * workspace folder only its owner can know, who sees through links and mounts.
 */
export type UsePath =
  | { readonly path: string }
  | { readonly problem: 'empty' | 'backslash' | 'absolute' | 'outside' };

export function usePath(from: string, written: string): UsePath {
  if (written.trim() === '') return { problem: 'empty' };
  if (written.includes('\\')) return { problem: 'backslash' };
  if (written.startsWith('/') || /^[A-Za-z][A-Za-z0-9+.-]*:/.test(written)) return { problem: 'absolute' };
  const { top, folders } = folderOf(from);
  const joined = [...folders];
  for (const segment of written.split('/')) {
    // A reader that decodes keys would climb on `%2e%2e`: a file that is really named so is not worth the hole.
    const decoded = segment.replace(/%2e/gi, '.');
    if (decoded !== segment && (decoded === '.' || decoded === '..')) return { problem: 'outside' };
    if (segment === '' || segment === '.') continue;
    if (segment !== '..') joined.push(segment);
    else if (0 < joined.length && joined[joined.length - 1] !== '..') joined.pop();
    else if (top === '') joined.push('..');
    else return { problem: 'outside' };
  }
  return { path: top + joined.join('/') };
}

/** `top` is what no `..` may remove: a scheme with its authority, a drive, or the leading slash. */
function folderOf(path: string): { readonly top: string; readonly folders: readonly string[] } {
  const top = /^(?:[A-Za-z][A-Za-z0-9+.-]*:\/\/[^/]*\/|[A-Za-z][A-Za-z0-9+.-]*:\/?|\/)?/.exec(path)![0];
  const folders = path.slice(top.length).split('/');
  folders.pop();
  return { top, folders };
}
