// Helpers of the commands in this folder. Plain JavaScript with nothing but Node's own modules: these commands run
// on a machine where nothing is installed yet, so neither TypeScript nor a package can be counted on.
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/** Absolute path of a file or folder of the repository. */
export const fromRoot = (...parts) => path.join(root, ...parts);

/** Prints one line of progress. */
export const say = (text) => console.log(`bidewell: ${text}`);

/**
 * Runs a command in the repository with its output on this terminal; gives its exit status (1 when it was killed or is
 * missing). SIGTERM and SIGINT end the command as well, so that stopping a build leaves nothing running.
 */
export function run(command, args, env = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      cwd: root,
      stdio: ['ignore', 'inherit', 'inherit'],
      env: { ...process.env, ...env },
    });
    const stop = (signal) => {
      child.kill(signal);
      process.exit(1);
    };
    process.on('SIGTERM', stop).on('SIGINT', stop);
    const end = (status) => {
      process.off('SIGTERM', stop).off('SIGINT', stop);
      resolve(status ?? 1);
    };
    child.on('error', (error) => {
      console.error(`bidewell: ${command}: ${error.message}`);
      end(1);
    });
    child.on('exit', end);
  });
}

/** As `run`, but ends this process with the same status when the command fails. */
export async function runOrExit(command, args, env) {
  const status = await run(command, args, env);
  if (status !== 0) process.exit(status);
}

/** Whether a program of that name is on the PATH. */
export function onPath(program) {
  return (process.env.PATH ?? '')
    .split(path.delimiter)
    .some((folder) => folder && fs.existsSync(path.join(folder, program)));
}

/** The Chromium to test with: BIDEWELL_CHROMIUM, else Debian's or another one on the PATH; null when there is none. */
export function chromiumPath() {
  const named = process.env.BIDEWELL_CHROMIUM;
  if (named) return fs.existsSync(named) ? named : null;
  for (const program of ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome']) {
    for (const folder of ['/usr/bin', ...(process.env.PATH ?? '').split(path.delimiter)]) {
      if (folder && fs.existsSync(path.join(folder, program))) return path.join(folder, program);
    }
  }
  return null;
}

/**
 * Runs a long-lived command, hands SIGINT and SIGTERM on to it and ends with its status; where a signal ended it that
 * came from nobody here (it crashed, the system ran out of memory), with 128 and the signal's number. A terminal sends
 * Ctrl-C to the child as well; the server takes a second signal as 'now', so it is handed on only where the child has
 * not had it.
 *
 * `onReady` gets what the command sends as `{ ready }` over its channel, once.
 */
export function runAndFollow(command, args, env = {}, onReady = null) {
  const child = spawn(command, args, {
    cwd: root,
    stdio: ['inherit', 'inherit', 'inherit', ...(onReady ? ['ipc'] : [])],
    env: { ...process.env, ...env },
  });
  const asked = new Set();
  for (const signal of ['SIGINT', 'SIGTERM']) {
    process.on(signal, () => {
      asked.add(signal);
      if (signal === 'SIGINT' && process.stdin.isTTY) return;
      child.kill(signal);
    });
  }
  child.on('message', (message) => {
    if (!message?.ready) return;
    child.disconnect();
    onReady(message.ready);
  });
  child.on('error', (error) => {
    console.error(`bidewell: ${command}: ${error.message}`);
    process.exit(1);
  });
  child.on('exit', (status, signal) =>
    process.exit(status ?? (asked.has(signal) ? 0 : 128 + os.constants.signals[signal])),
  );
  return child;
}

/** sha256 over the names and contents of files and folders (relative to the repository); missing ones count as empty. */
export function stampOf(inputs) {
  const hash = createHash('sha256');
  const walk = (relative) => {
    const file = fromRoot(relative);
    if (!fs.existsSync(file)) return;
    if (fs.statSync(file).isDirectory()) {
      for (const name of fs.readdirSync(file).sort()) walk(path.join(relative, name));
    } else {
      hash.update(relative).update('\0').update(fs.readFileSync(file)).update('\0');
    }
  };
  inputs.forEach(walk);
  return hash.digest('hex');
}
