/** Chromium with a fresh profile, and a record of every request that would have left the machine. */
import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { chromium } from 'playwright-core';

const flags = [
  '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync',
  // No name but this machine's resolves, so that what is recorded below cannot get out either.
  '--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE localhost, EXCLUDE *.localhost, EXCLUDE 127.0.0.1',
];

export async function launchBrowser({ chromium: executablePath, colorScheme = 'light', width = 1280, height = 800 }) {
  const profile = mkdtempSync(path.join(os.tmpdir(), 'quietrun-chromium-'));
  const context = await chromium.launchPersistentContext(profile, { executablePath, headless: true, colorScheme, viewport: { width, height }, args: flags });
  const outside = [];
  context.on('request', (request) => { if (leaves(request.url())) outside.push(request.url().slice(0, 200)); });
  const page = context.pages()[0] ?? (await context.newPage());
  page.on('websocket', (socket) => { if (leaves(socket.url())) outside.push(socket.url().slice(0, 200)); });
  const problems = [];
  page.on('pageerror', (error) => problems.push(error.message.slice(0, 400)));
  return {
    page, outside, problems,
    async close() {
      await context.close();
      rmSync(profile, { recursive: true, force: true });
    },
  };
}

function leaves(address) {
  const { protocol, hostname } = new URL(address);
  if (!/^(http|ws)s?:$/.test(protocol)) return false;
  // The workbench's own service worker answers these without asking any network.
  if (/\.vscode-resource\.vscode-cdn\.net$/.test(hostname)) return false;
  return !/(^|\.)localhost$/.test(hostname) && hostname !== '127.0.0.1';
}
