/**
 * What someone may do to the command line, run as a process of its own: each gets a finding or a refusal with the exit
 * status of the language reference (0 nothing, 1 findings, 2 could not run); nothing hangs, nothing raw reaches the terminal.
 */
import assert from 'node:assert/strict';
import { spawn, spawnSync } from 'node:child_process';
import { chmodSync, closeSync, existsSync, mkdirSync, mkdtempSync, openSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { after, before, describe, it } from 'node:test';
import { build } from 'esbuild';

const outer = mkdtempSync(path.join(tmpdir(), 'quietrun-hostile-'));
const folder = path.join(outer, 'boards');
const program = path.join(outer, 'cli.cjs');
const patience = 30_000;
const clean = 'net A { swing 1 V; rise 1 ns }\nstackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\nrun r on TOP for 10 mm { trace A 0.2 mm }\n';

before(async () => {
  mkdirSync(folder);
  await build({ entryPoints: ['server/src/cli.ts'], outfile: program, bundle: true, platform: 'node', format: 'cjs', target: 'node20', logLevel: 'error' });
  put('clean.quiet', clean);
});
after(() => rmSync(outer, { recursive: true, force: true }));

function put(name: string, text: string | Uint8Array): void {
  mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
  writeFileSync(path.join(folder, name), text);
}

function quietrun(words: readonly string[], input = '') {
  const { status, signal, stdout, stderr } = spawnSync(process.execPath, [program, ...words], { cwd: folder, input, encoding: 'utf8', timeout: patience, maxBuffer: 1 << 29 });
  assert.equal(signal, null, `quietrun ${words.join(' ').slice(0, 200)} hangs or crashes`);
  assert.doesNotMatch(stderr, /\n {4}at .*:\d+:\d+/, 'a stack trace is no refusal');
  // Line ends and nothing else: C0, DEL, C1.
  assert.doesNotMatch(stdout + stderr, /[\u0000-\u0009\u000b-\u001f\u007f-\u009f]/, 'a raw control character reaches the terminal');
  return { status, stdout, stderr };
}

function refused(words: readonly string[], why: RegExp): void {
  const { status, stdout, stderr } = quietrun(words);
  assert.equal(status, 2, `${words.join(' ')}: ${stdout.slice(0, 300)}${stderr.slice(0, 300)}`);
  assert.equal(stdout, '');
  assert.match(stderr, /^quietrun: /);
  assert.match(stderr, why);
}

function rulesOf(words: readonly string[], input = ''): { status: number | null; rules: readonly string[] } {
  const { status, stdout } = quietrun([...words, '--format', 'json'], input);
  return { status, rules: JSON.parse(stdout).files.flatMap((file: { findings: { rule: string }[] }) => file.findings.map(({ rule }) => rule)) };
}

describe('words that fit no command', () => {
  it('refuses none, unknown commands and options, values that do not fit', () => {
    refused([], /what is to be done/);
    refused(['check'], /which file/);
    refused(['--format', 'json'], /--format/);
    refused(['check', '--colour', 'clean.quiet'], /--colour/);
    refused(['check', '-x', 'clean.quiet'], /-x/);
    refused(['check', 'clean.quiet', '--format'], /text or json/);
    refused(['check', 'clean.quiet', '--format', 'xml'], /xml/);
    refused(['check', 'clean.quiet', '--fail-on', 'hint'], /hint/);
    refused(['check', 'clean.quiet', '--fail-on=error', '--fail-on=error'], /twice/);
    refused(['serve'], /--stdio/);
    refused(['explain', 'constructor'], /constructor/);
    refused(['__proto__'], /__proto__/);
    refused(['check', '-', '-'], /twice/);
    refused(['check', ''], /./);
  });

  it('takes what follows -- for files, as every command line does', () => {
    put('-dash.quiet', clean);
    put('--format', clean);
    assert.equal(quietrun(['check', '--', '-dash.quiet', '--format']).status, 0);
    assert.equal(quietrun(['check', './-dash.quiet']).status, 0);
    refused(['check', '-dash.quiet'], /-dash\.quiet/);
    refused(['check', '--'], /which file/);
  });

  it('shows no control character of a word that it refuses', () => {
    refused(['\u001b[2Jchek'], /no command/);
    refused(['check', '--\u001b]0;x\u0007'], /check has no/);
    refused(['check', 'none\u001b[31m\n\r\u009b.quiet'], /there is no file/);
    refused(['explain', '\u001b[2J'], /no rule/);
    refused(['check', 'clean.quiet', '--format', '\u001b[2J'], /takes/);
  });
});

describe('what is no readable file', () => {
  it('refuses a directory, what is missing, devices, pipes and sockets, without waiting for them', () => {
    mkdirSync(path.join(folder, 'folder.quiet'));
    refused(['check', 'folder.quiet'], /not a file/);
    refused(['check', 'clean.quiet/x.quiet'], /./);
    refused(['check', 'missing.quiet'], /there is no file/);
    refused(['check', 'x'.repeat(300)], /./);
    refused(['check', 'a/'.repeat(5000)], /./);
    if (process.platform === 'win32') return;
    refused(['check', '/dev/zero'], /not a file/);
    assert.equal(spawnSync('mkfifo', [path.join(folder, 'pipe.quiet')]).status, 0);
    refused(['check', 'pipe.quiet'], /not a file/);
  });

  it('refuses what may not be read', () => {
    if (process.platform === 'win32' || process.getuid?.() === 0) return;
    put('locked.quiet', clean);
    chmodSync(path.join(folder, 'locked.quiet'), 0);
    refused(['check', 'locked.quiet'], /cannot be read/);
  });

  it('refuses a file too large to be a board, and a link that leads in a circle', () => {
    put('large.quiet', 'x'.repeat(9 << 20));
    refused(['check', 'large.quiet'], /8 MiB/);
    if (process.platform === 'win32') return;
    symlinkSync('circle.quiet', path.join(folder, 'circle.quiet'));
    refused(['check', 'circle.quiet'], /cannot be read/);
  });

  it('refuses all of a command for one file that it cannot read', () => refused(['check', 'clean.quiet', 'missing.quiet'], /missing\.quiet/));
});

describe('uses that lead elsewhere', () => {
  const used = (name: string) => rulesOf(['check', '-'], `use "${name}"\n`);

  it('are an include finding each, and end', () => {
    writeFileSync(path.join(outer, 'secret.quiet'), 'net SECRET { swing 1 V; rise 1 ns }\n');
    put('Case.quiet', clean);
    put('directory/inner.quiet', clean);
    put('loop.quiet', 'use "loop.quiet"\n');
    const names = ['../secret.quiet', path.join(outer, 'secret.quiet').split(path.sep).join('/'), path.join(folder, 'clean.quiet').split(path.sep).join('/'), 'none.quiet', 'CASE.quiet', 'case.quiet', 'directory', 'x'.repeat(5000), 'a/'.repeat(3000),
      'directory/../../secret.quiet', 'loop.quiet', 'C:\\x.quiet', 'file:clean.quiet', 'clean.quiet\u0000', '~/x.quiet'];
    if (process.platform !== 'win32') {
      symlinkSync(path.join(outer, 'secret.quiet'), path.join(folder, 'out.quiet'));
      symlinkSync(outer, path.join(folder, 'way-out'));
      assert.equal(spawnSync('mkfifo', [path.join(folder, 'used-pipe.quiet')]).status, 0);
      names.push('out.quiet', 'way-out/secret.quiet', 'used-pipe.quiet', '/dev/zero', '/etc/hostname', '/proc/self/environ');
    }
    for (const name of names) {
      const { status, rules } = used(name);
      assert.equal(status, 1, name.slice(0, 100));
      assert.ok(rules.includes('include'), `${name.slice(0, 100)}: ${rules.join()}`);
      assert.ok(rules.length <= 2, `${name.slice(0, 100)}: one mistake gives at most two findings, not ${rules.join()}`);
    }
  });

  it('say nothing of what stands in a file outside', () => {
    const { stdout } = quietrun(['check', '-'], 'use "../secret.quiet"\n');
    assert.doesNotMatch(stdout, /SECRET|swing/);
  });

  it('end for a thousand files that use each other in a chain, which is refused, and in a fan, which is not', () => {
    for (let at = 0; at < 1000; at += 1) put(`chain/${at}.quiet`, at === 999 ? clean : `use "${at + 1}.quiet"\n`);
    // The project's own language reference bounds a chain to 16 files.
    assert.deepEqual(rulesOf(['check', 'chain/0.quiet']), { status: 1, rules: ['include'] });
    for (let at = 0; at < 900; at += 1) put(`fan/${at}.quiet`, `net N${at} { swing 1 V; rise 1 ns }\n`);
    put('fan/root.quiet', Array.from({ length: 900 }, (_, at) => `use "${at}.quiet"`).join('\n'));
    assert.deepEqual(rulesOf(['check', 'fan/root.quiet']), { status: 0, rules: [] });
  });

  it('are read once where a thousand files are checked at once, and each file given has its own answer', () => {
    const names = Array.from({ length: 1000 }, (_, at) => `many/${at}.quiet`);
    names.forEach((name, at) => put(name, at % 100 === 7 ? 'net\n' : 'use "shared.quiet"\n'));
    put('many/shared.quiet', clean);
    const { status, stdout } = quietrun(['check', ...names, '--format', 'json']);
    const report = JSON.parse(stdout);
    assert.equal(status, 1);
    assert.deepEqual(report.files.map((file: { path: string }) => file.path), names);
    assert.ok(10 <= report.summary.errors);
  });

  it('say the same of a file that is given twice', () => {
    const { status, stdout } = quietrun(['check', 'clean.quiet', './clean.quiet', '--format', 'json']);
    const { files } = JSON.parse(stdout);
    assert.equal(status, 0);
    assert.equal(files.length, 2, 'one for each FILE');
    assert.deepEqual(files.at(-1), files[0]);
  });
});

describe('standard input', () => {
  it('refuses what is too large or a folder, and a name that is none', () => {
    const large = quietrun(['check', '-'], '#'.repeat(9 << 20));
    assert.deepEqual([large.status, large.stdout], [2, '']);
    assert.match(large.stderr, /standard input is over 8 MiB/);
    refused(['check', '-', '--stdin-filename', ''], /takes a name/);
    if (process.platform === 'win32') return;
    const input = openSync(folder, 'r');
    const { status, stdout, stderr } = spawnSync(process.execPath, [program, 'check', '-'], { cwd: folder, stdio: [input, 'pipe', 'pipe'], encoding: 'utf8', timeout: patience });
    closeSync(input);
    assert.deepEqual([status, stdout], [2, '']);
    assert.match(stderr, /^quietrun: standard input cannot be read/);
  });
});

describe('output that nobody reads to its end', () => {
  it('ends quietly when the reader has gone', async () => {
    // A report much longer than a pipe holds.
    put('long.quiet', Array.from({ length: 4000 }, (_, at) => `nett N${at}\nnet N${at} {`).join('\n'));
    for (const format of ['text', 'json']) {
      const child = spawn(process.execPath, [program, 'check', 'long.quiet', '--format', format], { cwd: folder, stdio: ['ignore', 'pipe', 'pipe'] });
      let complaints = '';
      child.stderr.on('data', (more) => { complaints += more; });
      child.stdout.once('data', () => child.stdout.destroy());
      const timer = setTimeout(() => child.kill('SIGKILL'), patience);
      const [code, signal] = await new Promise<[number | null, string | null]>((resolve) => child.once('close', (...ended) => resolve(ended)));
      clearTimeout(timer);
      assert.equal(signal, null);
      assert.equal(complaints, '', 'a reader that has gone is no bug to report');
      assert.equal(code, 1, 'the findings are there, read or not');
    }
  });

  it('says where there is no room for it, and that the command did not run to its end', () => {
    if (!existsSync('/dev/full')) return;
    const full = openSync('/dev/full', 'w');
    const { status, stderr } = spawnSync(process.execPath, [program, 'check', 'clean.quiet'], { cwd: folder, stdio: ['ignore', full, 'pipe'], encoding: 'utf8', timeout: patience });
    closeSync(full);
    assert.deepEqual([status, stderr], [2, 'quietrun: the output cannot be written (ENOSPC)\n']);
  });
});
