import { readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { readSecrets } from '../../../server/secrets.ts';
import { tempFolder } from '../../support/temp-folder.ts';

describe('the farm’s own secrets', () => {
  it('when first asked for, are made, kept and readable by their owner only', () => {
    const folder = tempFolder();

    const first = readSecrets(folder);

    expect(first.sessionSecret).toMatch(/^[0-9a-f]{64}$/);
    expect(readSecrets(folder)).toEqual(first);
    expect(statSync(path.join(folder, 'secrets.json')).mode & 0o777).toBe(0o600);
    expect(readSecrets(tempFolder())).not.toEqual(first);
  });

  it.each(['', '{"sessionSecret":"short"}', 'not JSON'])(
    'when the file holds "%s", says so and leaves it as it is',
    (content) => {
      const folder = tempFolder();
      const file = path.join(folder, 'secrets.json');
      writeFileSync(file, content);

      expect(() => readSecrets(folder)).toThrow(`${file} is damaged.`);

      expect(readFileSync(file, 'utf8')).toBe(content);
    },
  );
});
