import { eq } from 'drizzle-orm';
import { expect, it } from 'vitest';
import { reservoirs } from '../../../server/db/schema/index.ts';
import { limewaterUse } from '../../../server/queries/limewater-use.ts';
import { systemUse } from '../../../server/queries/reservoir-use.ts';
import { shareReservoir } from '../../../server/services/reservoir-set-up.ts';
import { givenChangeOver, givenLevel, givenRefill, givenReservoir, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;

/** One reservoir of 60 L that feeds two systems, three parts to one. */
async function sharedFarm() {
  const farm = await startFarm();
  const [own, other] = [givenSystem(farm, { netVolumeL: 3000 }), givenSystem(farm, { netVolumeL: 1000 })];
  const reservoirId = givenReservoir(farm, own);
  givenShares(farm, reservoirId, { [own]: 0.75, [other]: 0.25 });
  return { farm, own, other, reservoirId };
}

function givenShares(farm: TestFarm, reservoirId: string, shares: Record<string, number>): void {
  const feeds = Object.entries(shares).map(([systemId, share]) => ({ systemId, share }));
  farm.write((write) => shareReservoir(write, reservoirId, rowOf(farm, reservoirId)?.version ?? 0, { feeds }));
}

function rowOf(farm: TestFarm, reservoirId: string) {
  return farm.db.select().from(reservoirs).where(eq(reservoirs.id, reservoirId)).get();
}

function litresOf(farm: TestFarm, systemId: string): number {
  return systemUse(farm.db, systemId, farm.deps.clock.now(), 30)
    .flatMap(({ intervals }) => intervals)
    .reduce((sum, { litres }) => sum + litres, 0);
}

it('when a shared reservoir is drawn, each system got its share', async () => {
  const { farm, own, other, reservoirId } = await sharedFarm();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);
  farm.wait(4 * DAY);
  givenLevel(farm, reservoirId, 20);

  expect([litresOf(farm, own), litresOf(farm, other)]).toEqual([30, 10]);
  expect(limewaterUse(farm.db, farm.deps.clock.now(), 28).map(({ litresPerDay }) => litresPerDay)).toEqual([7.5, 2.5]);
});

it('when the shares change, what was drawn before stays with those who got it', async () => {
  const { farm, own, other, reservoirId } = await sharedFarm();
  givenRefill(farm, reservoirId, { waterL: 60 });
  givenChangeOver(farm, reservoirId);
  farm.wait(2 * DAY);
  givenLevel(farm, reservoirId, 40);
  givenShares(farm, reservoirId, { [own]: 1 });
  farm.wait(2 * DAY);
  givenLevel(farm, reservoirId, 20);

  expect(litresOf(farm, own)).toBeCloseTo(15 + 20, 9);
  expect(litresOf(farm, other)).toBeCloseTo(5, 9);
});

it('when it is listed for either system, both see it; the whole dose is that of the smaller one', async () => {
  const { farm, own, other, reservoirId } = await sharedFarm();
  const grower = await farm.as('grower');
  const seen = async (systemId: string) => (await grower.get(`/api/reservoirs?systemId=${systemId}`)).body.items;

  expect(await seen(own)).toMatchObject([{ id: reservoirId }]);
  expect(await seen(other)).toMatchObject([{ id: reservoirId, systemId: own }]);
  expect((await seen(other))[0].feeds).toMatchObject([
    { systemId: own, share: 0.75 },
    { systemId: other, share: 0.25 },
  ]);
});

it('when it goes online, whatever was online for any of its systems comes off; Undo puts all back', async () => {
  const { farm, own, other, reservoirId } = await sharedFarm();
  const [first, second] = [givenReservoir(farm, own), givenReservoir(farm, other)];
  for (const id of [first, second, reservoirId]) givenRefill(farm, id);
  givenChangeOver(farm, first);
  givenChangeOver(farm, second);
  farm.wait(3_600_000);
  const grower = await farm.as('grower');

  const { body } = await grower.post(`/api/reservoirs/${reservoirId}/changeovers`).send({ formerLevelL: 30 });

  expect([first, second, reservoirId].map((id) => rowOf(farm, id)?.state)).toEqual(['standby', 'standby', 'online']);
  expect([first, second].map((id) => rowOf(farm, id)?.levelL)).toEqual([30, 50]);
  await grower.post(`/api/reservoirs/${reservoirId}/undo`).send({ eventId: body.event.id });
  expect([first, second].map((id) => rowOf(farm, id)?.state)).toEqual(['online', 'online']);
});

it.each([
  ['less than the whole', [0.5, 0.3], 422],
  ['no share', [1, 0], 400],
])('when the shares make up %s, they are refused', async (_, [mine = 0, theirs = 0], status) => {
  const { farm, own, other, reservoirId } = await sharedFarm();
  const grower = await farm.as('grower');
  const version = rowOf(farm, reservoirId)?.version ?? 0;

  const reply = await grower
    .put(`/api/reservoirs/${reservoirId}/feeds`)
    .set('If-Match', `"${version}"`)
    .send({ feeds: [own, other].map((systemId, index) => ({ systemId, share: index === 0 ? mine : theirs })) });

  expect(reply.status).toBe(status);
  expect(rowOf(farm, reservoirId)?.version).toBe(version);
});

it('when its own system would get nothing, or another has one online already, the shares are refused', async () => {
  const { farm, own, reservoirId } = await sharedFarm();
  const third = givenSystem(farm);
  const busy = givenReservoir(farm, third);
  for (const id of [busy, reservoirId]) {
    givenRefill(farm, id);
    givenChangeOver(farm, id);
  }
  const grower = await farm.as('grower');
  const share = async (feeds: object[]) =>
    grower
      .put(`/api/reservoirs/${reservoirId}/feeds`)
      .set('If-Match', `"${rowOf(farm, reservoirId)?.version ?? 0}"`)
      .send({ feeds });

  const without = await share([{ systemId: third, share: 1 }]);
  const twice = await share([own, third].map((systemId) => ({ systemId, share: 0.5 })));

  expect([without.body.fields[0].message, twice.body.fields[0].message]).toEqual([
    'Its own system must get a share.',
    expect.stringMatching(/is online for one of these systems/),
  ]);
});
