#!/usr/bin/env node
/** The command `quietrun`. */
import { createConnection, StreamMessageReader, StreamMessageWriter } from 'vscode-languageserver/node';
import { version } from '../../package.json';
import { run, status } from './cli/run';
import { readStandardInput } from './cli/standardInput';
import { diskReader } from './lsp/diskReader';
import { startServer } from './lsp/startServer';

// A reader that has gone, `quietrun check … | head`, is no fault: the exit status stands, read or not.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EPIPE') return;
    if (stream === process.stdout) process.stderr.write(`quietrun: the output cannot be written (${error.code ?? error.message})\n`);
    process.exit(status.notRun);
  });
}

const interrupted = new AbortController();
// Only what goes on until it is told to stop is told; anything else ends at once, as it does without us.
if (process.argv.includes('--watch')) process.once('SIGINT', () => interrupted.abort());

void run(process.argv.slice(2), {
  workingDirectory: process.cwd(),
  version,
  coloured: process.stdout.isTTY === true && (process.env['NO_COLOR'] ?? '') === '',
  write: (text) => process.stdout.write(text),
  complain: (text) => process.stderr.write(text),
  ...(process.stderr.isTTY === true ? { progress: (words: string | null) => process.stderr.write(`\r\u001b[K${words ?? ''}`) } : {}),
  readStandardInput,
  stop: interrupted.signal,
  serve: async () => {
    startServer(createConnection(new StreamMessageReader(process.stdin), new StreamMessageWriter(process.stdout)), diskReader);
    await new Promise((resolve) => process.stdin.once('close', resolve));
  },
}).then((code) => {
  process.exitCode = code;
});
