import { describe, expect, it } from 'vitest';
import { givenLabelledBatch } from '../../support/given-labels.ts';
import { startFarm } from '../../support/start-farm.ts';

describe('the public side of a plug', () => {
  it('when anyone asks by a code, tells line, cut month, care and farm, and not one thing more', async () => {
    const farm = await startFarm();
    const [code = ''] = givenLabelledBatch(farm).codes;

    const reply = await farm.anyone().get(`/api/public/plugs/${code}`);

    expect(reply.status).toBe(200);
    expect(reply.body).toEqual({
      code,
      lineCode: 'WIG',
      tradeName: 'Wicket Green',
      taxon: 'Acropora sp.',
      publicText: 'Grown here since its first cutting.',
      careText: 'Strong light, strong flow.',
      cutMonth: '2026-02',
      farmName: 'Test Farm',
    });
  });

  it.each(['lower case', 'dash', 'spaces'])('when the code is written with %s, finds the same plug', async (way) => {
    const farm = await startFarm();
    const [code = ''] = givenLabelledBatch(farm).codes;
    const spelt = {
      'lower case': code.toLowerCase(),
      dash: `${code.slice(0, 3)}-${code.slice(3)}`,
      spaces: ` ${code} `,
    };

    const reply = await farm.anyone().get(`/api/public/plugs/${encodeURIComponent(spelt[way as keyof typeof spelt])}`);

    expect(reply.body).toMatchObject({ code });
  });

  it('when two characters are swapped, suggests the code that was meant without telling whether it exists', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get('/api/public/plugs/JTDDA1W');

    expect(reply.status).toBe(404);
    expect(reply.body).toMatchObject({ code: 'record.not_found', details: { suggestion: 'TJDDA1W' } });
    expect(reply.body.detail).toContain('TJD-DA1W');
  });

  it.each(['TJDDA1W', 'X', '%F0%9F%90%A0', "'%20OR%201=1--", '..%2F..%2Fetc', 'A'.repeat(200)])(
    'when %s is no plug of this farm, says so kindly',
    async (text) => {
      const farm = await startFarm();

      const reply = await farm.anyone().get(`/api/public/plugs/${text}`);

      expect([reply.status, reply.body.code]).toEqual([404, 'record.not_found']);
    },
  );

  it('when the code is longer than any address, is refused as input', async () => {
    const farm = await startFarm();

    const reply = await farm.anyone().get(`/api/public/plugs/${'A'.repeat(201)}`);

    expect([reply.status, reply.body.code]).toEqual([400, 'input.invalid']);
  });

  it('when one network asks for hundreds, it has to wait', async () => {
    const farm = await startFarm();
    const visitor = farm.anyone();

    for (let asked = 0; asked < 300; asked += 1) await visitor.get('/api/public/plugs/X');
    const reply = await visitor.get('/api/public/plugs/X');

    expect([reply.status, reply.body.code]).toEqual([429, 'rate.limited']);
    expect(Number(reply.headers['retry-after'])).toBeGreaterThan(0);
  });
});
