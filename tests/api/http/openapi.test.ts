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

  it('says of every endpoint what it takes and what it answers, and refers to nothing that is not in it', async () => {
    const farm = await startFarm();
    const { endpoints } = createApp(farm.deps, 'a secret only for listing the endpoints').api;

    const { body, text } = await farm.anyone().get('/api/openapi.json');

    for (const { method, path, answer, upload, edits, creates } of endpoints) {
      const operation = body.paths[path.replace(/:([a-zA-Z]+)/g, '{$1}')][method];
      const name = `${method} ${path}`;
      const [done] = Object.entries<{ content: object }>(operation.responses).filter(
        ([status]) => status !== 'default',
      );
      expect([done?.[0], Object.keys(done?.[1].content ?? {})], name).toEqual([
        creates ? '201' : '200',
        [answer === 'file' ? '*/*' : 'application/json'],
      ]);
      const names = operation.parameters.map((each: { in: string; name: string }) => `${each.in} ${each.name}`);
      expect(new Set(names).size, name).toBe(names.length);
      expect(names.includes('header If-Match'), name).toBe(edits === true);
      expect(names.includes('header Idempotency-Key'), name).toBe(creates === true);
      if (upload) {
        const form = operation.requestBody.content['multipart/form-data'].schema;
        expect(form.properties[upload.field], name).toEqual({ type: 'string', format: 'binary' });
      }
    }
    expect(new Set(text.match(/"\$ref":"[^"]*"/g))).toEqual(new Set(['"$ref":"#/components/schemas/Problem"']));
    expect(body.components.schemas.Problem.type).toBe('object');
    expect(text).not.toContain('"$schema"');
  });

  it('marks a query field as required where leaving it out is refused', async () => {
    const farm = await startFarm();

    const { body } = await farm.anyone().get('/api/openapi.json');

    const required = (path: string) =>
      body.paths[path].get.parameters
        .filter((each: { required: boolean }) => each.required)
        .map((each: { name: string }) => each.name);
    expect(required('/api/costs/export')).toEqual(['table']);
    expect(required('/api/orders')).toEqual([]);
  });
});
