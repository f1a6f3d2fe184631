import { spawn } from 'node:child_process';
import { describe, expect, it, vi } from 'vitest';
import { CALCULATORS } from '../../../shared/domain/calculators/index.ts';
import { root } from '../../../server/tasks/prepare.mjs';

/** Starting tsx takes long on a busy machine. */
vi.setConfig({ testTimeout: 60_000 });

/** Runs the command as `npm run -s calc -- NAME` does, with these lines to read. */
function runCalc(name: string, lines: readonly string[]) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/tasks/calc.ts', name], { cwd: root });
  let [said, complained] = ['', ''];
  child.stdout.on('data', (chunk: Buffer) => (said += chunk.toString('utf8')));
  child.stderr.on('data', (chunk: Buffer) => (complained += chunk.toString('utf8')));
  child.stdin.end(lines.join('\n'));
  return new Promise<{ code: number | null; answers: Record<string, unknown>[]; complained: string }>((resolve) => {
    child.once('close', (code) => {
      const answers = said.split('\n').filter(Boolean);
      resolve({ code, answers: answers.map((line) => JSON.parse(line)), complained });
    });
  });
}

describe('the command for calculations', () => {
  it('when a line is bad, tells so in its place, goes on and ends well', async () => {
    const good = '{"lime_g":100,"purity":1,"water_L":40,"temperature_C":25}';
    const { code, answers } = await runCalc('limewater', [
      ...[good, 'not JSON', '', good.replace('"purity":1', '"purity":95'), good.replace('lime_g', 'lime'), good],
    ]);

    expect(code).toBe(0);
    expect(answers).toEqual([
      expect.objectContaining({ dissolved_g: expect.closeTo(59.72, 9) }),
      { error: 'This line is not JSON.' },
      { error: 'Purity must be above 0 % and at most 100 %.' },
      { error: expect.stringContaining('lime_g') },
      expect.objectContaining({ dissolved_g: expect.closeTo(59.72, 9) }),
    ]);
  });

  it('when very many lines come, answers each in order', async () => {
    const lines = Array.from({ length: 20_000 }, (_, index) => `{"salinity":${index % 40},"temperature_C":25}`);
    const { code, answers } = await runCalc('density', lines);

    expect(code).toBe(0);
    expect(answers).toHaveLength(20_000);
    expect(answers[35]).toEqual({ density_kg_m3: expect.closeTo(1023.3412, 3) });
    expect(answers[19_999]).toEqual(answers[39]);
  });

  it.each(['', 'limestone', 'toString'])('when the name is "%s", lists the names and ends with 2', async (name) => {
    const { code, answers, complained } = await runCalc(name, ['{}']);

    expect(code).toBe(2);
    expect(answers).toEqual([]);
    for (const known of Object.keys(CALCULATORS)) expect(complained).toContain(known);
  });
});
