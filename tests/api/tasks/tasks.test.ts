import { describe, expect, it } from 'vitest';
import type { Task } from '../../../shared/contracts/tasks.ts';
import { auditLog, readings, taskOutcomes } from '../../../server/db/schema/index.ts';
import { settleTasks } from '../../../server/services/task-settling.ts';
import { givenTask } from '../../support/given-tasks.ts';
import { givenChangeOver, givenRefill, givenReservoir, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;

async function listed(farm: TestFarm, query = '') {
  const reply = await (await farm.as('grower')).get(`/api/tasks${query}`);
  expect(reply.status).toBe(200);
  return reply.body;
}

async function peopleOf(farm: TestFarm): Promise<{ id: string; name: string; role: string }[]> {
  return (await (await farm.as('grower')).get('/api/task-people')).body.items;
}

describe('tasks', () => {
  it('when one is added, it stands on the list by its first day and is audited', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm, { code: 'B' });
    const grower = await farm.as('grower');

    const reply = await grower.post('/api/tasks').send({
      ...{ kind: 'test', title: 'Test calcium', systemId, parameter: 'calcium', startsOn: '2026-03-02' },
      repeat: { every: 'weeks', interval: 1, weekdays: [3] },
    });

    expect(reply.status).toBe(201);
    expect(reply.body).toMatchObject({ dueOn: '2026-03-04', systemCode: 'B', assigneeName: null, last: null });
    expect((await listed(farm)).items).toEqual([reply.body]);
    expect(
      farm.db
        .select()
        .from(auditLog)
        .all()
        .map(({ action }) => action),
    ).toContain('task.created');
  });

  it('when many wait, they come by day, a page at a time, with what presses counted', async () => {
    const farm = await startFarm();
    for (const startsOn of ['2026-03-05', '2026-03-01', '2026-03-02', '2026-02-27']) givenTask(farm, { startsOn });

    const first = await listed(farm, '?limit=3');
    const second = await listed(farm, `?limit=3&cursor=${first.nextCursor}`);

    expect([...first.items, ...second.items].map(({ dueOn }: Task) => dueOn)).toEqual([
      '2026-02-27',
      '2026-03-01',
      '2026-03-02',
      '2026-03-05',
    ]);
    expect(first).toMatchObject({ total: 4, today: '2026-03-02', overdue: 2, dueToday: 1 });
  });

  it('when asked for mine, those of other people and other roles are left out', async () => {
    const farm = await startFarm();
    const people = await peopleOf(farm);
    const idOf = (role: string) => people.find((person) => person.role === role)?.id ?? null;
    givenTask(farm, { title: 'For anyone' });
    givenTask(farm, { title: 'For growers', assigneeRole: 'grower' });
    givenTask(farm, { title: 'For owners', assigneeRole: 'owner' });
    givenTask(farm, { title: 'For me', assigneeId: idOf('grower') });
    givenTask(farm, { title: 'For the owner', assigneeId: idOf('owner') });

    const mine = await listed(farm, '?whose=mine');

    expect(mine.items.map(({ title }: Task) => title).sort()).toEqual(['For anyone', 'For growers', 'For me']);
    expect(people.map(({ role }) => role).sort()).toEqual(['grower', 'owner']);
  });

  it('when a test is done with its reading, both are kept in one step and it is due again', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const task = givenTask(farm, { kind: 'test', title: 'Test alkalinity', systemId, parameter: 'alkalinity' });
    const grower = await farm.as('grower');
    const reading = { systemId, values: [{ parameter: 'alkalinity', value: 8.1, unit: 'dKH' }] };

    const reply = await grower
      .post(`/api/tasks/${task.id}/completions`)
      .send({ dueOn: task.dueOn, note: 'New kit.', readings: reading });

    expect(reply.status).toBe(201);
    expect(reply.body.task).toMatchObject({ dueOn: '2026-03-03', last: { kind: 'done', by: 'Test grower' } });
    expect(farm.db.select().from(readings).all()).toMatchObject([{ id: reply.body.readingIds[0], systemId }]);
    expect(farm.db.select().from(taskOutcomes).all()).toMatchObject([{ dueOn: '2026-03-02', note: 'New kit.' }]);
  });

  it('when the reading is refused, the task stays open', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const task = givenTask(farm, { kind: 'test', title: 'Test alkalinity', systemId, parameter: 'alkalinity' });
    const reading = { systemId, values: [{ parameter: 'alkalinity', value: 83, unit: 'meq/L' }] };

    const reply = await (
      await farm.as('grower')
    )
      .post(`/api/tasks/${task.id}/completions`)
      .send({ dueOn: task.dueOn, readings: reading });

    expect(reply.status).toBe(400);
    expect((await listed(farm)).items[0].dueOn).toBe(task.dueOn);
  });

  it('when two people settle the same day, the second is told', async () => {
    const farm = await startFarm();
    const task = givenTask(farm);
    const grower = await farm.as('grower');
    const complete = () => grower.post(`/api/tasks/${task.id}/completions`).send({ dueOn: task.dueOn });
    await complete();

    const second = await complete();

    expect(second.status).toBe(409);
    expect(farm.db.select().from(taskOutcomes).all()).toHaveLength(1);
  });

  it('when one is skipped, the reason is kept and it can be taken back until more is said', async () => {
    const farm = await startFarm();
    const task = givenTask(farm);
    const skip = await (
      await farm.as('grower')
    )
      .post(`/api/tasks/${task.id}/skips`)
      .send({ dueOn: task.dueOn, reason: 'No socks left' });
    farm.wait(DAY);
    const grower = await farm.as('grower');
    const done = await grower.post(`/api/tasks/${task.id}/completions`).send({ dueOn: skip.body.task.dueOn });

    const early = await grower.delete(`/api/task-outcomes/${skip.body.outcomeId}`);
    const undone = await grower.delete(`/api/task-outcomes/${done.body.outcomeId}`);

    expect(early.status).toBe(409);
    expect(undone.status).toBe(200);
    expect((await listed(farm)).items[0].dueOn).toBe('2026-03-03');
    const outcomes = (await grower.get('/api/task-outcomes')).body.items;
    expect(outcomes).toMatchObject([{ kind: 'skipped', note: 'No socks left', isLast: true, byItself: false }]);
  });

  it('when a task is ended, it leaves the list, and comes back when taken up again', async () => {
    const farm = await startFarm();
    const task = givenTask(farm);
    const owner = await farm.as('owner');

    const ended = await owner.post(`/api/tasks/${task.id}/end`);
    const gone = (await listed(farm)).total;
    await owner.post(`/api/tasks/${task.id}/resume`);

    expect(ended.body.ended).toBe(true);
    expect(gone).toBe(0);
    expect((await listed(farm)).total).toBe(1);
  });

  it('when its rule changes, the next day that fits is due; a stale edit is refused with what stands', async () => {
    const farm = await startFarm();
    const task = givenTask(farm);
    const grower = await farm.as('grower');
    const change = (version: number) =>
      grower
        .patch(`/api/tasks/${task.id}`)
        .set('If-Match', `"${version}"`)
        .send({ repeat: { every: 'weeks', interval: 2, weekdays: [5] } });

    const changed = await change(task.version);
    const stale = await change(task.version);

    expect(changed.body).toMatchObject({ dueOn: '2026-03-06', version: task.version + 1 });
    expect(stale.status).toBe(412);
    expect(stale.body.details.current).toMatchObject({ dueOn: '2026-03-06' });
  });

  it.each([
    [{ assigneeId: '00000000-0000-4000-8000-00000000dead' }, 'assigneeId'],
    [{ assigneeRole: 'viewer' }, 'assigneeRole'],
    [{ parameter: 'calcium' }, 'parameter'],
    [{ repeat: { every: 'dates', dates: ['2026-01-01'] } }, 'repeat'],
    [{ startsOn: '1026-03-02' }, 'startsOn'],
  ])('when it can not be so, it is refused at its field: %o', async (wrong, path) => {
    const farm = await startFarm();

    const reply = await (
      await farm.as('grower')
    )
      .post('/api/tasks')
      .send({ kind: 'other', title: 'Something', startsOn: '2026-03-02', ...wrong });

    expect(reply.status).toBe(400);
    expect(reply.body.fields.map((field: { path: string }) => field.path)).toEqual([path]);
  });
});

describe('what is logged settles the tasks that ask for it', () => {
  const test = { kind: 'test', systemId: '', parameter: 'alkalinity' } as const;

  it('when the parameter and the system fit, and for no other', async () => {
    const farm = await startFarm();
    const [systemId, otherId] = [givenSystem(farm), givenSystem(farm)];
    const fits = givenTask(farm, { ...test, systemId });
    const anyTest = givenTask(farm, { ...test, systemId, parameter: null });
    const calcium = givenTask(farm, { ...test, systemId, parameter: 'calcium' });
    const other = givenTask(farm, { ...test, systemId: otherId });

    farm.write((write) => settleTasks(write, { ...test, systemId }));

    const dueOn = new Map((await listed(farm)).items.map((task: Task) => [task.id, task.dueOn]));
    expect([fits, anyTest, calcium, other].map(({ id }) => dueOn.get(id))).toEqual([
      '2026-03-03',
      '2026-03-03',
      '2026-03-02',
      '2026-03-02',
    ]);
  });

  it('when the same is tested twice a day, tomorrow is asked for all the same', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    givenTask(farm, { ...test, systemId });

    farm.write((write) => settleTasks(write, { ...test, systemId }));
    farm.wait(HOUR);
    farm.write((write) => settleTasks(write, { ...test, systemId }));

    expect((await listed(farm)).items[0].dueOn).toBe('2026-03-03');
  });

  it('when tests stand at hours of one day, one reading settles only those whose time has come', async () => {
    const farm = await startFarm(); // 9:00 in Lisbon
    const systemId = givenSystem(farm);
    for (const dueMinute of [10 * 60, 13 * 60]) givenTask(farm, { ...test, systemId, repeat: null, dueMinute });
    farm.wait(HOUR);

    farm.write((write) => settleTasks(write, { ...test, systemId }));

    expect((await listed(farm)).items.map(({ dueMinute }: Task) => dueMinute)).toEqual([13 * 60]);
  });

  it('when an old reading is written down late, today is asked for all the same', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    givenTask(farm, { ...test, systemId });

    farm.write((write) => settleTasks(write, { ...test, systemId, at: farm.deps.clock.now() - 2 * DAY }));

    expect((await listed(farm)).items[0].dueOn).toBe('2026-03-02');
  });

  it('when the reading is taken back, its task is due again', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const task = givenTask(farm, { ...test, systemId });
    const grower = await farm.as('grower');
    const body = { systemId, values: [{ parameter: 'alkalinity', value: 8.1, unit: 'dKH' }] };
    const logged = await grower.post('/api/readings').send(body);
    const settled = (await listed(farm)).items[0];

    await grower.delete(`/api/readings/${logged.body.items[0].id}`);

    expect(settled).toMatchObject({ id: task.id, dueOn: '2026-03-03', last: { kind: 'done', by: 'Test grower' } });
    expect((await listed(farm)).items[0]).toMatchObject({ dueOn: '2026-03-02', last: null });
  });

  it('when limewater is mixed and swapped, the tasks of the system and of the reservoir that ask for it are done', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const [reservoirId, otherId] = [givenReservoir(farm, systemId), givenReservoir(farm, systemId)];
    const weekly = { repeat: { every: 'after_done' as const, days: 7 } };
    const mix = givenTask(farm, { ...weekly, kind: 'refill', systemId });
    const swap = givenTask(farm, { ...weekly, kind: 'changeover', systemId });
    const other = givenTask(farm, { ...weekly, kind: 'refill', systemId, reservoirId: otherId });

    givenRefill(farm, reservoirId);
    givenChangeOver(farm, reservoirId);

    const dueOn = new Map((await listed(farm)).items.map((task: Task) => [task.id, task.dueOn]));
    expect([mix, swap, other].map(({ id }) => dueOn.get(id))).toEqual(['2026-03-09', '2026-03-09', '2026-03-02']);
  });
});
