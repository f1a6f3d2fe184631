import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';

const Secrets = z.object({ sessionSecret: z.string().min(32) });

/**
 * The farm's own secrets, made on first start into the data folder, readable by its owner only.
 * @throws {Error} where the file is damaged
 */
export function readSecrets(dataDir: string): z.infer<typeof Secrets> {
  const file = path.join(dataDir, 'secrets.json');
  if (!existsSync(file)) {
    writeFileSync(file, JSON.stringify({ sessionSecret: randomBytes(32).toString('hex') }), {
      mode: 0o600,
      flag: 'wx',
    });
  }
  const secrets = Secrets.safeParse(jsonOf(readFileSync(file, 'utf8')));
  if (secrets.success) return secrets.data;
  throw new Error(`${file} is damaged. Restore it, or delete it: a new one is made, and everybody signs in again.`);
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}
