import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

const Secrets = z.object({ sessionSecret: z.string().min(32) });

/** The farm's own secrets, made on first start into the data folder, readable by its owner only. */
export function readSecrets(dataDir: string): z.infer<typeof Secrets> {
  const file = path.join(dataDir, 'secrets.json');
  if (!existsSync(file)) {
    writeFileSync(file, JSON.stringify({ sessionSecret: randomBytes(32).toString('hex') }), {
      mode: 0o600,
      flag: 'wx',
    });
  }
  return Secrets.parse(JSON.parse(readFileSync(file, 'utf8')));
}
