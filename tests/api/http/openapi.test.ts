import { describe, expect, it } from 'vitest';
import { createApp } from '../../../server/app.ts';
import { startFarm } from '../../support/start-farm.ts';

describe('the OpenAPI document', () => {
  it('lists every endpoint with its access and its parameters', async () => {
    const farm = await startFarm();
    const { endpoints } = createApp(farm.deps, 'a secret only for listing the endpoints').api;

    const { body } = await farm.anyone().get('/api/openapi.json');

    expect(body.openapi).toBe('3.1.0');
    for (const { method, path, access } of endpoints) {
      const operation = body.paths[path.replace(/:([a-zA-Z]+)/g, '{$1}')]?.[method];
      expect(operation, `${method} ${path}`).toMatchObject({ 'x-access': access, summary: expect.any(String) });
      const inPath = operation.parameters.filter((each: { in: string }) => each.in === 'path');
      expect(inPath, `${method} ${path}`).toHaveLength((path.match(/:/g) ?? []).length);
    }
  });
});
