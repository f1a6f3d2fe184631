// Plain JavaScript, since it runs before anything is installed.
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = fileURLToPath(new URL('../..', import.meta.url));
const inRoot = (...parts) => path.join(root, ...parts);

/** Installs the locked packages where they are missing or the lock file has changed since. */
export function ensureInstalled() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    console.error(`Limestead needs Node.js 20.19 or newer; this is ${process.versions.node}.`);
    process.exit(1);
  }
  const lockHash = createHash('sha256')
    .update(readFileSync(inRoot('package-lock.json')))
    .digest('hex');
  const stamp = inRoot('node_modules', '.limestead-lock');
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lockHash) return;
  console.log('Installing packages (npm ci) …');
  run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error']);
  writeFileSync(stamp, lockHash);
}

/** Builds the client where it is missing or older than its sources. */
export function ensureBuilt() {
  const built = inRoot('dist', 'index.html');
  const sources = ['src', 'shared', 'index.html', 'vite.config.ts', 'package-lock.json'];
  const newest = Math.max(...sources.map((source) => newestChange(inRoot(source))));
  if (existsSync(built) && statSync(built).mtimeMs > newest) return;
  console.log('Building the client …');
  run(process.execPath, [inRoot('node_modules', 'vite', 'bin', 'vite.js'), 'build', '--logLevel', 'warn']);
}

/** Runs a TypeScript task to its end and stops this process if it fails. */
export function runTask(file, args = [], env = process.env) {
  run(process.execPath, ['--import', 'tsx', inRoot(file), ...args], env);
}

export function ensureFolder(folder) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
}

function run(command, args, env = process.env) {
  const { status, error } = spawnSync(command, args, { cwd: root, stdio: 'inherit', env });
  if (error) console.error(error.message);
  if (status !== 0) process.exit(status ?? 1);
}

function newestChange(file) {
  const stats = statSync(file);
  if (!stats.isDirectory()) return stats.mtimeMs;
  return Math.max(stats.mtimeMs, ...readdirSync(file).map((name) => newestChange(path.join(file, name))));
}
