/**
 * The file system of the web host: `boards://memory/…`, read from the test server, written to memory
 * only. It is a virtual file system like any other, which is what the web needs tested.
 */
const vscode = require('vscode');
const { FileChangeType, FileSystemError, FileType } = vscode;

exports.activate = (context) => {
  const server = context.extensionUri.with({ path: '/boards' });
  const written = new Map();
  const deleted = new Set();
  const changes = new vscode.EventEmitter();

  async function ask(uri, query) {
    if (deleted.has(uri.path)) throw FileSystemError.FileNotFound(uri);
    const response = await fetch(server.with({ path: `/boards${uri.path}`, query }).toString());
    if (response.status !== 200) throw FileSystemError.FileNotFound(uri);
    return response;
  }

  const provider = {
    onDidChangeFile: changes.event,
    watch: () => ({ dispose() {} }),
    async stat(uri) {
      const own = written.get(uri.path);
      return own ? own.stat : (await ask(uri, 'stat')).json();
    },
    async readDirectory(uri) {
      const below = uri.path.endsWith('/') ? uri.path : `${uri.path}/`;
      const entries = new Map(await (await ask(uri, 'list')).json());
      for (const path of written.keys()) if (path.startsWith(below) && !path.slice(below.length).includes('/')) entries.set(path.slice(below.length), FileType.File);
      for (const path of deleted) if (path.startsWith(below)) entries.delete(path.slice(below.length));
      return [...entries];
    },
    async readFile(uri) {
      const own = written.get(uri.path);
      return own ? own.data : new Uint8Array(await (await ask(uri, '')).arrayBuffer());
    },
    writeFile(uri, data) {
      const type = written.has(uri.path) ? FileChangeType.Changed : FileChangeType.Created;
      deleted.delete(uri.path);
      written.set(uri.path, { data, stat: { type: FileType.File, ctime: 0, mtime: Date.now(), size: data.length } });
      changes.fire([{ type, uri }]);
    },
    delete(uri) {
      written.delete(uri.path);
      deleted.add(uri.path);
      changes.fire([{ type: FileChangeType.Deleted, uri }]);
    },
    rename(uri) { throw FileSystemError.NoPermissions(uri); },
    createDirectory(uri) { throw FileSystemError.NoPermissions(uri); },
  };
  context.subscriptions.push(vscode.workspace.registerFileSystemProvider('boards', provider, { isCaseSensitive: true }));
};
