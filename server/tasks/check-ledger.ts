import path from 'node:path';
import { readConfig } from '../config.ts';
import { checkLedger, rebuildBalances } from '../db/check-ledger.ts';
import { openDatabase } from '../db/client.ts';

/** Compares balances and plug places with the movements. `--rebuild` first makes them anew from the movements. */
function main(): void {
  const { sqlite } = openDatabase(path.join(readConfig(process.env).dataDir, 'limestead.sqlite'));
  if (process.argv.includes('--rebuild')) rebuildBalances(sqlite);
  const { movements, batches, plugs, problems } = checkLedger(sqlite);
  sqlite.close();

  const lines = problems.map(
    ({ law, about, found, expected }) => `${law}: ${about} has ${found}, should be ${expected}`,
  );
  process.stdout.write(
    [`${movements} movements of ${plugs} plugs in ${batches} batches checked.`, ...lines, ''].join('\n'),
  );
  if (problems.length > 0) {
    process.stdout.write(`${problems.length} differences. Run it with -- --rebuild to follow the movements.\n`);
    process.exitCode = 1;
  }
}

main();
