import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { onTestFinished } from 'vitest';

/** A folder that is gone after the test. */
export function tempFolder(): string {
  const folder = mkdtempSync(path.join(tmpdir(), 'limestead-test-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}
