/** `npm start`: the main job on the example with findings, and how to go on from there. */
import { spawnSync } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.dirname(path.dirname(fileURLToPath(import.meta.url)));
const board = 'examples/buoy/listening-post.quiet';
const { status } = spawnSync(process.execPath, ['dist/cli.cjs', 'check', board], { cwd: root, stdio: 'inherit' });

// Findings are what this example is for: status 1 is its success.
if (status === 1) {
  console.log(`
To see the same board in an editor: open this folder in VS Code and press F5, then open ${board}.
To check a board of yours: node dist/cli.cjs check FILE`);
} else process.exitCode = 2;
