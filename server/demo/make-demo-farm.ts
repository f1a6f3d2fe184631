import { existsSync, mkdirSync, renameSync, rmSync } from 'node:fs';
import path from 'node:path';
import { readConfig } from '../config.ts';
import { makeDemoFarm } from './demo-farm.ts';

const SEED = 20_260_412;

/** Makes the demo farm's database in the data folder, unless there is one. Half-made files never take its place. */
async function main(): Promise<void> {
  const { dataDir } = readConfig(process.env);
  const file = path.join(dataDir, 'limestead.sqlite');
  if (existsSync(file)) {
    console.log(`${file} is there already.`);
    return;
  }
  mkdirSync(dataDir, { recursive: true });
  const unfinished = `${file}.making`;
  removeDatabase(unfinished);
  console.log('Making the demo farm, 18 months of work …');
  const started = Date.now();
  await makeDemoFarm({ file: unfinished, now: started, seed: SEED, log: (line) => console.log(line) });
  renameSync(unfinished, file);
  console.log(`The demo farm is ready (${((Date.now() - started) / 1000).toFixed(0)} s).`);
}

function removeDatabase(file: string): void {
  for (const each of [file, `${file}-wal`, `${file}-shm`]) rmSync(each, { force: true });
}

main().catch((error: unknown) => {
  console.error(error);
  process.exit(1);
});
