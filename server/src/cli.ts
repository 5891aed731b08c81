#!/usr/bin/env node
/** The command `quietrun`. */
import { createConnection, StreamMessageReader, StreamMessageWriter } from 'vscode-languageserver/node';
import { version } from '../../package.json';
import { run } from './cli/run';
import { diskReader } from './lsp/diskReader';
import { startServer } from './lsp/startServer';

// A reader that has gone, `quietrun check … | head`, is no fault: the exit status stands, read or not.
for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error;
  });
}

async function readStandardInput(): Promise<string> {
  const chunks: Buffer[] = [];
  for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
  return new TextDecoder('utf-8').decode(Buffer.concat(chunks));
}

void run(process.argv.slice(2), {
  workingDirectory: process.cwd(),
  version,
  coloured: process.stdout.isTTY === true && (process.env['NO_COLOR'] ?? '') === '',
  write: (text) => process.stdout.write(text),
  complain: (text) => process.stderr.write(text),
  readStandardInput,
  serve: async () => {
    startServer(createConnection(new StreamMessageReader(process.stdin), new StreamMessageWriter(process.stdout)), diskReader);
    await new Promise((resolve) => process.stdin.once('close', resolve));
  },
}).then((code) => {
  process.exitCode = code;
});
