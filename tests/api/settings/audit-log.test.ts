import Papa from 'papaparse';
import { describe, expect, it } from 'vitest';
import { auditLog } from '../../../server/db/schema/index.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const OWNER = '00000000-0000-4000-8000-00000000aaaa';

function given(farm: TestFarm, entries: Partial<typeof auditLog.$inferInsert>[]): void {
  for (const entry of entries) {
    farm.db
      .insert(auditLog)
      .values({ at: 1, actorName: 'Limestead', action: 'rack.moved', entity: 'rack', entityId: 'r1', ...entry })
      .run();
  }
}

/** Sign-ins are written down too; the tests look at what they wrote themselves. */
async function asViewer(farm: TestFarm) {
  const viewer = await farm.as('viewer');
  return async (query: string) => (await viewer.get(`/api/audit?${query}`)).body;
}

describe('the audit log', () => {
  it('when paged, every change comes once, newest first', async () => {
    const farm = await startFarm();
    given(
      farm,
      Array.from({ length: 7 }, (_, index) => ({ entityId: `r${index}` })),
    );
    const list = await asViewer(farm);

    const first = await list('entity=rack&limit=3');
    const second = await list(`entity=rack&limit=3&cursor=${first.nextCursor}`);
    const third = await list(`entity=rack&limit=3&cursor=${second.nextCursor}`);

    const ids = [first, second, third].flatMap(({ items }) => items.map((item: { entityId: string }) => item.entityId));
    expect(ids).toEqual(['r6', 'r5', 'r4', 'r3', 'r2', 'r1', 'r0']);
    expect([first.total, third.nextCursor]).toEqual([7, null]);
  });

  it('when filtered by days, they are days of the farm with both ends included', async () => {
    const farm = await startFarm();
    // Lisbon is an hour ahead of UTC in July.
    given(farm, [
      { entityId: 'before', at: Date.parse('2025-07-09T22:59:59.999Z') },
      { entityId: 'start', at: Date.parse('2025-07-09T23:00:00Z') },
      { entityId: 'end', at: Date.parse('2025-07-11T22:59:59.999Z') },
      { entityId: 'after', at: Date.parse('2025-07-11T23:00:00Z') },
    ]);
    const list = await asViewer(farm);

    const { items } = await list('from=2025-07-10&to=2025-07-11');

    expect(items.map(({ entityId }: { entityId: string }) => entityId)).toEqual(['end', 'start']);
  });

  it('when filtered by person, record or the product itself, only those come', async () => {
    const farm = await startFarm();
    given(farm, [
      { entity: 'rack', entityId: 'r1', actorId: OWNER, actorName: 'Owner' },
      { entity: 'rack', entityId: 'r2' },
      { entity: 'tank', entityId: 't1' },
    ]);
    const list = await asViewer(farm);

    expect((await list(`actor=${OWNER}`)).items).toMatchObject([{ entityId: 'r1', actorName: 'Owner' }]);
    expect((await list('actor=system')).total).toBe(2);
    expect((await list('entity=rack&entityId=r2')).total).toBe(1);
  });

  it('when a change is shown, it carries the record before and after', async () => {
    const farm = await startFarm();
    given(farm, [{ before: { code: 'R1' }, after: { code: 'R2' } }, { after: { code: 'R3' } }]);
    const list = await asViewer(farm);

    expect((await list('entity=rack')).items).toMatchObject([
      { before: null, after: { code: 'R3' } },
      { before: { code: 'R1' }, after: { code: 'R2' } },
    ]);
  });

  it('when asked what to filter by, names kinds of record and people', async () => {
    const farm = await startFarm();
    given(farm, [{ entity: 'tank' }, { entity: 'rack' }, { entity: 'rack' }]);

    const { body } = await (await farm.as('viewer')).get('/api/audit/choices');

    expect(body.entities).toEqual(['rack', 'tank', 'user']);
    expect(body.actors).toContainEqual({ id: 'system', name: 'Limestead' });
    expect(body.actors).toContainEqual({ id: expect.any(String), name: 'Test grower' });
  });

  it('when exported, the file holds what the filter names, oldest first, with formulas defused', async () => {
    const farm = await startFarm();
    given(farm, [
      { actorName: '=HYPERLINK("x")', at: Date.parse('2026-01-05T10:00:00Z'), after: { note: 'a, "b"\nc' } },
      { entity: 'tank' },
      { entityId: 'r2' },
    ]);

    const reply = await (await farm.as('viewer')).get('/api/audit/export?entity=rack');

    expect(reply.get('Content-Disposition')).toBe('attachment; filename="audit-log.csv"');
    const { data } = Papa.parse<Record<string, string>>(reply.text.replace('\uFEFF', ''), {
      header: true,
      skipEmptyLines: true,
    });
    expect(data).toHaveLength(2);
    expect(data[0]).toMatchObject({ at: '2026-01-05T10:00:00.000Z', person: '\'=HYPERLINK("x")', record_id: 'r1' });
    expect(JSON.parse(data[0]?.after ?? '')).toEqual({ note: 'a, "b"\nc' });
  });

  it('when someone tries to change or delete a line of it, the database refuses', async () => {
    const farm = await startFarm();
    given(farm, [{}]);

    expect(() => farm.db.update(auditLog).set({ actorName: 'Nobody' }).run()).toThrow();
    expect(() => farm.db.delete(auditLog).run()).toThrow();
  });

  it.each(['from=yesterday', 'to=2026-02-30', 'actor=me', 'limit=0', 'limit=5000', 'cursor=!!!', 'order=asc'])(
    'when asked with %s, says what is wrong',
    async (query) => {
      const farm = await startFarm();

      const reply = await (await farm.as('viewer')).get(`/api/audit?${query}`);

      expect(reply.status).toBe(400);
      expect(reply.body.fields).toHaveLength(1);
    },
  );
});
