import { spawn } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { getPriority, setPriority } from 'node:os';
import { endWithLauncher } from './death-signal.mjs';
import { root } from './environment.mjs';

/** @type {Set<import('node:child_process').ChildProcess>} */
const running = new Set();

/** Ends the programs that `run` has started and that are still going, before this process leaves. */
export function endRunning() {
  for (const child of running) child.kill('SIGTERM');
}

/**
 * Runs a program to its end and keeps what it wrote.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, input?: string, uid?: number, gid?: number,
 *   isPatient?: boolean }} [options] isPatient: it takes what time the others leave
 * @returns {Promise<{ code: number, output: string, stdout: string }>} code is 127 when the program
 *   is missing and 128 when a signal ended it
 */
export function run(command, args, options = {}) {
  const { input, isPatient, ...rest } = options;
  return new Promise((resolve) => {
    const [program, ...words] = endWithLauncher([command, ...args], 'TERM');
    const child = spawn(program, words, { cwd: root, ...rest, stdio: ['pipe', 'pipe', 'pipe'] });
    running.add(child);
    if (isPatient && child.pid !== undefined) setPriority(child.pid, Math.max(10, getPriority()));
    let output = '';
    let stdout = '';
    child.stdout.setEncoding('utf8');
    child.stderr.setEncoding('utf8');
    child.stdout.on('data', (chunk) => {
      output += chunk;
      stdout += chunk;
    });
    child.stderr.on('data', (chunk) => {
      output += chunk;
    });
    child.stdin.on('error', () => {});
    child.stdin.end(input ?? '');
    child.on('error', (error) =>
      resolve({ code: 127, output: `${output}${error.message}\n`, stdout }),
    );
    child.on('close', (code) => {
      running.delete(child);
      resolve({ code: code ?? 128, output, stdout });
    });
  });
}

/**
 * State and start time of a process, which together with its number tell it from a later process
 * that was given the same number.
 *
 * @returns {{ name: string, state: string, startTicks: string } | null} null when there is none
 */
export function readProcess(/** @type {number} */ pid) {
  try {
    const text = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const end = text.lastIndexOf(')');
    const fields = text.slice(end + 2).split(' ');
    return {
      name: text.slice(text.indexOf('(') + 1, end),
      state: fields[0],
      startTicks: fields[19],
    };
  } catch {
    return null;
  }
}

/** A process that has ended but was not yet collected by its parent does not count as alive. */
export function isAlive(/** @type {number} */ pid, /** @type {string | undefined} */ startTicks) {
  const found = readProcess(pid);
  if (found === null || found.state === 'Z' || found.state === 'X') return false;
  return startTicks === undefined || found.startTicks === startTicks;
}

export const wait = (/** @type {number} */ milliseconds) =>
  new Promise((resolve) => setTimeout(resolve, milliseconds));

/** @returns {Promise<boolean>} whether the condition became true in time */
export async function waitUntil(
  /** @type {() => boolean | Promise<boolean>} */ condition,
  /** @type {number} */ milliseconds,
  step = 50,
) {
  const end = Date.now() + milliseconds;
  while (!(await condition())) {
    if (Date.now() > end) return false;
    await wait(step);
  }
  return true;
}
