import { describe, expect, it } from 'vitest';
import { calendarFeeds, users } from '../../../server/db/schema/index.ts';
import { givenTask } from '../../support/given-tasks.ts';
import { givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

async function addressOf(farm: TestFarm): Promise<string> {
  const { url } = (await (await farm.as('grower')).post('/api/account/calendar')).body;
  return new URL(url).pathname;
}

async function read(farm: TestFarm, address: string) {
  const reply = await farm.anyone().get(address);
  return { status: reply.status, type: reply.get('Content-Type'), text: reply.text.replaceAll('\r\n ', '') };
}

describe('the calendar of a person', () => {
  it('when its address is opened without signing in, the person’s tasks are there as whole days', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { code: 'A' });
    givenTask(farm, {
      title: 'Test calcium; then note',
      systemId,
      repeat: { every: 'weeks', interval: 1, weekdays: [3] },
    });
    givenTask(farm, { title: 'Not mine', assigneeRole: 'owner' });
    const address = await addressOf(farm);

    const { status, type, text } = await read(farm, address);

    expect([status, type]).toEqual([200, 'text/calendar; charset=utf-8']);
    expect(text).toContain('SUMMARY:A: Test calcium\\; then note\r\n');
    expect(text).toContain('DTSTART;VALUE=DATE:20260304\r\nRRULE:FREQ=WEEKLY;INTERVAL=1;BYDAY=WE;WKST=MO\r\n');
    expect(text).not.toContain('Not mine');
    expect(text.match(/BEGIN:VEVENT/g)).toHaveLength(1);
  });

  it('when a task has its hour, each of its days has its own right time in UTC', async () => {
    const farm = await startFarm({ now: '2026-03-27T09:00:00Z' });
    givenTask(farm, { startsOn: '2026-03-28', dueMinute: 8 * 60 });

    const { text } = await read(farm, await addressOf(farm));

    // Summer time begins in Lisbon on 29 March.
    expect(text).toContain('DTSTART:20260328T080000Z');
    expect(text).toContain('DTSTART:20260329T070000Z');
    const uids = text.match(/UID:.*/g) ?? [];
    expect(new Set(uids).size).toBe(uids.length);
  });

  it('when a new address is made, the old one stops; when it is ended or the person leaves, none holds', async () => {
    const farm = await startFarm();
    const old = await addressOf(farm);
    const address = await addressOf(farm);
    const statuses = [(await read(farm, old)).status, (await read(farm, address)).status];
    farm.db.update(users).set({ disabledAt: 1 }).run();
    statuses.push((await read(farm, address)).status);
    farm.db.update(users).set({ disabledAt: null }).run();
    await (await farm.as('grower')).delete('/api/account/calendar');
    statuses.push((await read(farm, address)).status);

    expect(statuses).toEqual([404, 200, 404, 404]);
  });

  it('the database holds no secret that opens it', async () => {
    const farm = await startFarm();
    const token = /calendar\/(.+)\.ics/.exec(await addressOf(farm))?.[1] ?? '';

    expect(token.length).toBeGreaterThan(40);
    expect(JSON.stringify(farm.db.select().from(calendarFeeds).all())).not.toContain(token);
  });

  it.each(['nobody', 'a'.repeat(43), '..%2f..%2fetc'])(
    'when the secret is made up, there is no such calendar: %s',
    async (token) => {
      const farm = await startFarm();

      const { status } = await read(farm, `/api/calendar/${token}.ics`);

      expect(status).toBe(404);
    },
  );
});
