import { copyFileSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { makeDemoFarm } from '../../../server/demo/demo-farm.ts';

export const DATABASE = 'limestead.sqlite';
const SEED = 20_260_412;

/** A demo farm that lived until now, in a folder of its own. Browser tests work on copies of it. */
export async function makeTemplate(): Promise<string> {
  // Where many runs follow each other, as while writing these tests, they may share one farm made before.
  const made = process.env.DEMO_TEMPLATE;
  if (made) return made;
  const folder = newFolder();
  await makeDemoFarm({ file: path.join(folder, DATABASE), now: Date.now(), seed: SEED });
  return folder;
}

/** A data folder with a copy of the template, or an empty one. */
export function copyOf(template: string | null): string {
  const folder = newFolder();
  if (template) copyFileSync(path.join(template, DATABASE), path.join(folder, DATABASE));
  mkdirSync(folder, { recursive: true });
  return folder;
}

export function removeFolder(folder: string): void {
  if (folder !== process.env.DEMO_TEMPLATE) rmSync(folder, { recursive: true, force: true });
}

function newFolder(): string {
  return mkdtempSync(path.join(tmpdir(), 'limestead-farm-'));
}
