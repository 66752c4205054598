/** Runs one command as its own process and says how long it took and how much memory it needed at most. */
import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const GNU_TIME = '/usr/bin/time';
const POLL_MS = 20;

/**
 * @typedef {object} Measured
 * @property {number} seconds wall time, process start to exit
 * @property {number} peakMiB largest resident set
 * @property {number | null} cpuSeconds user and system time of all its threads; null without GNU time
 * @property {number} status
 * @property {string} stdout
 * @property {string} stderr
 */

/**
 * Peak memory is the kernel's own figure through GNU time; where that is missing, VmHWM polled from /proc.
 * @param {string} command
 * @param {readonly string[]} args
 * @returns {Promise<Measured>}
 */
export async function measure(command, args) {
  const scratch = mkdtempSync(join(tmpdir(), 'measure-'));
  const report = join(scratch, 'peak');
  const timed = existsSync(GNU_TIME);
  const [program, programArgs] = timed
    ? [GNU_TIME, ['--quiet', '-f', '%M %U %S', '-o', report, command, ...args]]
    : [command, args];
  const started = performance.now();
  const child = spawn(program, programArgs, { stdio: ['ignore', 'pipe', 'pipe'] });
  let polledKiB = 0;
  const poll = timed ? null : setInterval(() => (polledKiB = Math.max(polledKiB, highWaterKiB(child.pid))), POLL_MS);
  const stdout = gather(child.stdout);
  const stderr = gather(child.stderr);
  const status = await new Promise((resolve, reject) => {
    child.once('error', reject);
    child.once('close', (code) => resolve(code ?? -1));
  });
  const seconds = (performance.now() - started) / 1000;
  if (poll !== null) clearInterval(poll);
  const [peakKiB, user, system] = timed ? readFileSync(report, 'utf8').trim().split(' ').map(Number) : [polledKiB];
  const cpuSeconds = timed ? user + system : null;
  rmSync(scratch, { recursive: true });
  return { seconds, peakMiB: peakKiB / 1024, cpuSeconds, status, stdout: stdout(), stderr: stderr() };
}

function gather(stream) {
  let text = '';
  stream.setEncoding('utf8');
  stream.on('data', (chunk) => (text += chunk));
  return () => text;
}

function highWaterKiB(pid) {
  try {
    return Number(/^VmHWM:\s+(\d+) kB/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1] ?? 0);
  } catch {
    return 0;
  }
}
