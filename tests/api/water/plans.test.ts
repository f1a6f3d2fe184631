import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { auditLog, dosingPlans, tasks } from '../../../server/db/schema/index.ts';
import { MS_PER_DAY } from '../../../shared/domain/days.ts';
import { type DosedOptions, givenDosedSystem, givenMeans, planOf } from '../../support/given-plans.ts';
import { givenReading, givenRefill, givenSystem } from '../../support/given-water.ts';
import { startFarm } from '../../support/start-farm.ts';

async function aFarm(options: Partial<DosedOptions> = {}) {
  const farm = await startFarm();
  const { limeId, supplementId } = givenMeans(farm);
  const system = givenDosedSystem(farm, { limeItemId: limeId, ...options });
  return { farm, supplementId, ...system, grower: await farm.as('grower') };
}

describe('advice on the dosing of a system', () => {
  it('when the level slips, is a stronger mix with what it is based on, and the reservoir to fill', async () => {
    const { systemId, standbyId, grower } = await aFarm();

    const { advice, facts, mix, plan, dismissed } = await planOf(grower, systemId);

    expect(advice.kind).toBe('change');
    expect(facts).toMatchObject({ netVolumeL: 1000, assumed: expect.not.arrayContaining(['phNbs']) });
    // 5 L a day, as drawn; demand is what goes in and what the level falls.
    expect(advice.limewater?.litresPerDay).toBeCloseTo(5, 1);
    expect(advice.limewater?.strengthMeqL).toBeGreaterThan(facts.limewater?.onlineMeqL ?? Infinity);
    expect(mix).toMatchObject({ reservoirId: standbyId, waterL: 100 });
    expect(mix?.limeG).toBeCloseTo((advice.limewater?.limeGPerL ?? 0) * 100, 6);
    expect([plan, dismissed]).toEqual([null, null]);
  });

  it('when the level holds, is to leave it', async () => {
    const { systemId, grower } = await aFarm({ perDayDkh: 0 });
    const { advice } = await planOf(grower, systemId);
    expect(advice).toMatchObject({ kind: 'hold', limewater: null });
  });

  it('of a system without anything is to test', async () => {
    const farm = await startFarm();
    const systemId = givenSystem(farm);
    const { advice, mix } = await planOf(await farm.as('viewer'), systemId);
    expect(advice.kind).toBe('wait_for_tests');
    expect(mix).toBeNull();
  });

  it('for all systems comes in one answer, in the order of their codes', async () => {
    const { farm, systemId, grower } = await aFarm();
    const otherId = givenSystem(farm, { code: 'A-0' });
    const { body } = await grower.get('/api/plans');
    expect(body.items.map((each: { systemId: string }) => each.systemId)).toEqual([otherId, systemId]);
  });
});

describe('accepting advice', () => {
  it('when it is accepted, runs as the plan, asks for the mix and is kept with what it was based on', async () => {
    const { farm, systemId, standbyId, grower } = await aFarm();
    const { key, advice } = await planOf(grower, systemId);

    const reply = await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key });

    expect(reply.status).toBe(201);
    expect(reply.body.plan).toMatchObject({ limeGPerL: advice.limewater?.limeGPerL, toAt: null, by: 'Test grower' });
    expect(reply.body.advice.kind).toBe('mix_plan');
    const asked = farm.db.select().from(tasks).all();
    expect(asked).toMatchObject([{ kind: 'refill', systemId, reservoirId: standbyId }]);
    expect(asked[0]?.title).toContain(`${advice.limewater?.limeGPerL.toFixed(2)} g of lime`);
    const history = await grower.get(`/api/systems/${systemId}/advice`);
    expect(history.body).toMatchObject({
      items: [{ kind: 'change', outcome: 'accepted', facts: { netVolumeL: 1000 }, isLast: true }],
      total: 1,
    });
    expect(history.body.items[0].text).toContain('g of lime a litre');
    const audited = farm.db.select({ action: auditLog.action }).from(auditLog).all();
    expect(audited.map(({ action }) => action)).toEqual(
      expect.arrayContaining(['advice.accepted', 'dosing_plan.started', 'task.created']),
    );
  });

  it('when limewater was mixed by it, waits for tests before the next change', async () => {
    const { farm, systemId, standbyId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);
    await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key });
    farm.wait(MS_PER_DAY / 24);

    givenRefill(farm, standbyId, { waterL: 80, limeG: 90 });

    expect((await planOf(grower, systemId)).advice.kind).not.toBe('mix_plan');
  });

  it('when the same request comes twice, there is one plan', async () => {
    const { farm, systemId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);
    const send = () =>
      grower
        .post(`/api/systems/${systemId}/advice/accept`)
        .set('Idempotency-Key', 'one-plan-only-please')
        .send({ key });

    const replies = [await send(), await send()];

    expect(replies.map(({ status }) => status)).toEqual([201, 201]);
    expect(replies[1]?.body).toEqual(replies[0]?.body);
    expect(farm.db.select().from(dosingPlans).all()).toHaveLength(1);
  });

  it('when the advice is another one by now, is refused and nothing is written', async () => {
    const { farm, systemId, grower } = await aFarm();
    const reply = await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key: 'change 0.10 0.0' });
    expect(reply.status).toBe(409);
    expect(reply.body.detail).toContain('Read it again');
    expect(farm.db.select().from(dosingPlans).all()).toEqual([]);
  });

  it('when the amounts have drifted by what nobody would measure, is the same advice', async () => {
    const { systemId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);
    const [kind = '', ...amounts] = key.split(' ');
    const drifted = [kind, ...amounts.map((amount) => (Number(amount) * 1.03).toPrecision(4))].join(' ');
    const reply = await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key: drifted });
    expect(reply.status).toBe(201);
  });

  it('when the advice is to leave it, there is nothing to accept or dismiss', async () => {
    const { systemId, grower } = await aFarm({ perDayDkh: 0 });
    const { key } = await planOf(grower, systemId);
    for (const [act, more] of [
      ['accept', {}],
      ['dismiss', { reason: 'No need' }],
    ] as const) {
      const reply = await grower.post(`/api/systems/${systemId}/advice/${act}`).send({ key, ...more });
      expect([act, reply.status]).toEqual([act, 409]);
    }
  });

  it('when the level is far too low, asks for each day of the correction', async () => {
    const { farm, systemId, grower } = await aFarm({ fromDkh: 5.6, perDayDkh: -0.02 });
    const { key, advice } = await planOf(grower, systemId);
    expect(advice.kind).toBe('correct_low');

    await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key });

    const correction = farm.db.select().from(tasks).where(eq(tasks.kind, 'other')).get();
    expect(correction?.title).toMatch(/^Correct .* mL of /);
    expect(correction?.repeat).toMatchObject({ every: 'dates', dates: { length: advice.correction?.days } });
  });
});

describe('changing advice', () => {
  it('when other amounts are decided with a reason, they run and are told apart', async () => {
    const { systemId, supplementId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);
    const changes = { limeGPerL: 0.9, supplements: [{ itemId: supplementId, amountPerDay: 10 }] };

    const reply = await grower
      .post(`/api/systems/${systemId}/advice/accept`)
      .send({ key, changes, reason: 'The pH is high already.' });

    expect(reply.body.plan).toMatchObject({
      limeGPerL: 0.9,
      supplements: [{ itemId: supplementId, amountPerDay: 10 }],
    });
    // 0.9 g of 95 % lime in a litre: 0.855 g of hydroxide, 2 eq for 74.092 g.
    expect(reply.body.plan.strengthMeqL).toBeCloseTo((0.855 * 2000) / 74.092, 3);
    const history = await grower.get(`/api/systems/${systemId}/advice`);
    expect(history.body.items[0]).toMatchObject({ outcome: 'changed', reason: 'The pH is high already.' });
  });

  it('when the advice is to leave it, other amounts may be decided all the same', async () => {
    const { systemId, grower } = await aFarm({ perDayDkh: 0 });
    const { key } = await planOf(grower, systemId);
    const reply = await grower
      .post(`/api/systems/${systemId}/advice/accept`)
      .send({ key, changes: { limeGPerL: 0.85 }, reason: 'Many frags go in tomorrow.' });
    expect(reply.status).toBe(201);
    expect(reply.body.plan).toMatchObject({ limeGPerL: 0.85, litresPerDay: expect.closeTo(5, 1) });
  });

  it.each([
    ['without a reason', { limeGPerL: 0.9 }, '', 'reason'],
    ['to more lime than dissolves', { limeGPerL: 2 }, 'More is more', 'changes.limeGPerL'],
    ['to a supplement that is none', { supplements: 'lime' }, 'Why not', 'changes.supplements.0.itemId'],
    ['to more than the water bears', { supplements: 'plenty' }, 'In a hurry', 'changes.supplements'],
  ])('when it is changed %s, is refused at the field', async (_, changes, reason, path) => {
    const { farm, systemId, supplementId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);
    const supplements = {
      lime: [{ itemId: systemId, amountPerDay: 5 }],
      plenty: [{ itemId: supplementId, amountPerDay: 500_000 }],
    };
    const sent =
      'supplements' in changes && changes.supplements
        ? { supplements: supplements[changes.supplements as keyof typeof supplements] }
        : changes;

    const reply = await grower.post(`/api/systems/${systemId}/advice/accept`).send({ key, changes: sent, reason });

    expect(reply.status).toBe(400);
    expect(reply.body.fields[0].path).toBe(path);
    expect(farm.db.select().from(dosingPlans).all()).toEqual([]);
  });
});

describe('dismissing advice and taking answers back', () => {
  it('when it is dismissed, is quiet for a week and then comes again', async () => {
    const { farm, systemId, grower } = await aFarm();
    const { key } = await planOf(grower, systemId);

    const reply = await grower
      .post(`/api/systems/${systemId}/advice/dismiss`)
      .send({ key, reason: 'A harvest comes.' });

    expect(reply.body.dismissed).toMatchObject({ by: 'Test grower', reason: 'A harvest comes.' });
    farm.wait(8 * MS_PER_DAY);
    for (const daysAgo of [3, 2, 1]) {
      givenReading(farm, systemId, 6.6, { takenAt: farm.deps.clock.now() - daysAgo * MS_PER_DAY });
    }
    // Eight days end every session.
    expect((await planOf(await farm.as('grower'), systemId)).dismissed).toBeNull();
  });

  it('when the last plan is taken back, the one before runs again and its work is off', async () => {
    const { farm, systemId, standbyId, grower } = await aFarm();
    const accept = async (changes: object) => {
      const { key } = await planOf(grower, systemId);
      return grower.post(`/api/systems/${systemId}/advice/accept`).send({ key, changes, reason: 'Step by step' });
    };
    await accept({ limeGPerL: 0.8 });
    farm.wait(MS_PER_DAY / 24);
    givenRefill(farm, standbyId, { waterL: 20, limeG: 16 });
    const second = await accept({ limeGPerL: 0.9 });
    expect(second.status).toBe(201);
    const [last] = (await grower.get(`/api/systems/${systemId}/advice`)).body.items;

    const reply = await grower.delete(`/api/advice/${last.id}`);

    expect(reply.status).toBe(200);
    expect((await planOf(grower, systemId)).plan?.limeGPerL).toBe(0.8);
    const open = farm.db
      .select()
      .from(tasks)
      .all()
      .filter(({ endedAt }) => endedAt === null);
    expect(open.map(({ cause }) => cause)).not.toContain(last.id);
    expect((await grower.delete(`/api/advice/${last.id}`)).status).toBe(409);
  });
});

describe('water rules', () => {
  it('when one is changed, the advice follows it', async () => {
    const { systemId, grower } = await aFarm();
    const rules = await grower.get('/api/water-rules');

    const reply = await grower
      .patch('/api/water-rules')
      .set('If-Match', rules.headers.etag ?? '')
      .send({ strengthStep: 0.02 });

    expect(reply.body).toMatchObject({ strengthStep: 0.02, phLimit: 8.5, version: rules.body.version + 1 });
    const { advice, facts } = await planOf(grower, systemId);
    expect(advice.limewater?.strengthMeqL).toBeLessThanOrEqual(
      (facts.limewater?.onlineMeqL ?? 0) + 0.02 * 40.31 + 0.01,
    );
    expect(advice.rules).toContain('small_step');
  });

  it('when someone else changed them meanwhile, are refused with what they are now', async () => {
    const { grower } = await aFarm();
    await grower.patch('/api/water-rules').set('If-Match', '"1"').send({ phLimit: 8.4 });
    const reply = await grower.patch('/api/water-rules').set('If-Match', '"1"').send({ phLimit: 8.6 });
    expect(reply.status).toBe(412);
    expect(reply.body.details.current.phLimit).toBe(8.4);
  });

  it('when a value is out of its bounds, is refused at its field', async () => {
    const { grower } = await aFarm();
    const reply = await grower.patch('/api/water-rules').set('If-Match', '"1"').send({ phLimit: 11 });
    expect(reply.status).toBe(400);
    expect(reply.body.fields).toEqual([{ path: 'phLimit', message: 'At most 9.' }]);
  });
});
