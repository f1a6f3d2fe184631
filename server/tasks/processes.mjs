import { spawn } from 'node:child_process';
import { root } from './prepare.mjs';

const children = [];
let stopping = false;

/** Starts a long-running child; when one of them ends, all end. */
export function startProcess(name, args, env = {}) {
  const child = spawn(process.execPath, args, { cwd: root, stdio: 'inherit', env: { ...process.env, ...env } });
  child.on('exit', (code) => {
    if (!stopping) console.error(`${name} stopped${code ? ` with ${code}` : ''}.`);
    stopAll(code ?? 0);
  });
  children.push(child);
  return child;
}

export function stopAll(code = 0) {
  if (stopping) return;
  stopping = true;
  process.exitCode = code;
  for (const child of children) if (child.exitCode === null) child.kill('SIGTERM');
}

export function stopOnSignals() {
  for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => stopAll(0));
}

/** Waits until an address answers, for at most a minute. */
export async function answers(url) {
  for (let tries = 0; tries < 300; tries += 1) {
    try {
      if ((await fetch(url)).ok) return true;
    } catch {
      // Not up yet.
    }
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
  return false;
}
