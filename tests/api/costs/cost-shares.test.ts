import { expect, it } from 'vitest';
import { costMonths, costShares } from '../../../server/db/schema/index.ts';
import { batchCost, plugCost } from '../../../server/queries/batch-cost.ts';
import { bringCostsUpToDate } from '../../../server/services/cost-shares.ts';
import { givePlugs } from '../../../server/services/remove-plugs.ts';
import { undoAct } from '../../../server/services/undo-stock.ts';
import { givenCut, givenLoss, givenPlaced, givenRack } from '../../support/given-stock.ts';
import { givenGlue, givenItem, givenLot, givenUse } from '../../support/given-supplies.ts';
import { givenSystem, givenTank } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const DAY = 86_400_000;

function refresh(farm: TestFarm): void {
  farm.write(bringCostsUpToDate);
}

function givenBench(farm: TestFarm): { systemId: string; rackId: string } {
  const systemId = givenSystem(farm);
  return { systemId, rackId: givenRack(farm, { tankId: givenTank(farm, systemId) }) };
}

/** Lime at 0.01 a gram, taken for one system. */
function givenLimeUse(farm: TestFarm, systemId: string, grams: number, at?: number): void {
  const itemId = givenItem(farm);
  givenLot(farm, itemId, { quantity: 1000, costMinor: 1000, receivedOn: '2026-01-01' });
  givenUse(farm, itemId, grams, { systemId, cause: 'refill', ...(at === undefined ? {} : { at }) });
}

it('when two batches stand in a system, they share its month by frag-days to the last unit', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const { systemId, rackId } = givenBench(farm);
  const early = givenCut(farm, { pieces: 4, target: { kind: 'rack', rackId } });
  farm.wait(2 * DAY);
  const late = givenCut(farm, { pieces: 3, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 100);

  refresh(farm);

  // 4 pieces from 2 to 4 March are 12 frag-days, 3 pieces on 4 March are 3: 1.00 is shared 12 : 3.
  expect(batchCost(farm.db, early.batchId)).toMatchObject({ limeMicro: 800_000, fragDays: 12, living: 4 });
  expect(batchCost(farm.db, late.batchId)).toMatchObject({ limeMicro: 200_000, fragDays: 3, living: 3 });
  expect(batchCost(farm.db, early.batchId)).toMatchObject({ perLivingMicro: 200_000, limePerLivingMicro: 200_000 });
});

it('when a cut takes plugs and glue, they are a cost of its batch alone', async () => {
  const farm = await startFarm();
  const plugItemId = givenItem(farm, { kind: 'plug', unit: 'piece', strength: null });
  const glueItemId = givenGlue(farm);
  givenLot(farm, plugItemId, { quantity: 100, costMinor: 1500 });
  givenLot(farm, glueItemId, { quantity: 300, costMinor: 900 });
  const cut = givenCut(farm, { pieces: 10, plugItemId, glueItemId, gluePerPiece: 0.3 });
  const other = givenCut(farm);

  refresh(farm);

  // Ten plugs at 0.15 and 3 g of glue at 0.03.
  expect(batchCost(farm.db, cut.batchId)).toMatchObject({ cutMicro: 1_590_000, perLivingMicro: 159_000, limeMicro: 0 });
  expect(batchCost(farm.db, other.batchId)).toMatchObject({ cutMicro: 0, totalMicro: 0, perLivingMicro: 0 });
});

it('when pieces are lost, the survivors carry their cost and the lost plug has none', async () => {
  const farm = await startFarm();
  const { systemId, rackId } = givenBench(farm);
  const cut = givenCut(farm, { pieces: 4, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 120);
  farm.wait(DAY);
  const lost = cut.plugs[0]?.code ?? '';
  const alive = cut.plugs[1]?.code ?? '';
  givenLoss(farm, [lost]);

  refresh(farm);

  expect(batchCost(farm.db, cut.batchId)).toMatchObject({ living: 3, totalMicro: 1_200_000, perLivingMicro: 400_000 });
  expect(plugCost(farm.db, alive)).toMatchObject({ costMicro: 400_000, limeMicro: 400_000 });
  expect(plugCost(farm.db, lost)).toMatchObject({ costMicro: null, limeMicro: null });
});

it('when a piece is given away, it takes its share along and the rest carry no more than theirs', async () => {
  const farm = await startFarm();
  const { systemId, rackId } = givenBench(farm);
  const cut = givenCut(farm, { pieces: 4, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 120);
  farm.write((write) => givePlugs(write, { codes: [cut.plugs[0]?.code ?? ''], to: 'A school' }));

  refresh(farm);

  expect(batchCost(farm.db, cut.batchId)).toMatchObject({ living: 3, leftAlive: 1, perLivingMicro: 300_000 });
  expect(plugCost(farm.db, cut.plugs[0]?.code ?? '')).toMatchObject({ costMicro: 300_000 });
});

it('when plugs move to another system, each system shares with them for its own days', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const [from, to] = [givenBench(farm), givenBench(farm)];
  const mover = givenCut(farm, { pieces: 2, target: { kind: 'rack', rackId: from.rackId } });
  givenCut(farm, { pieces: 2, target: { kind: 'rack', rackId: to.rackId } });
  farm.wait(3 * DAY);
  givenPlaced(
    farm,
    mover.plugs.map(({ code }) => code),
    to.rackId,
  );
  givenLimeUse(farm, from.systemId, 10);
  givenLimeUse(farm, to.systemId, 10);

  refresh(farm);

  // All of the first system's 0.10; of the second's, one day of its own two pieces' four: 2 of 10 frag-days.
  expect(batchCost(farm.db, mover.batchId)).toMatchObject({ limeMicro: 100_000 + 20_000, fragDays: 6 + 2 });
});

it('when a move is taken back days later, the costs are as if it had never been, past months too', async () => {
  const farm = await startFarm({ now: '2026-02-27T09:00:00Z' });
  const [home, away] = [givenBench(farm), givenBench(farm)];
  const cut = givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId: home.rackId } });
  givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId: away.rackId } });
  givenLimeUse(farm, away.systemId, 10);
  const groupId = givenPlaced(farm, [cut.plugs[0]?.code ?? ''], away.rackId);
  refresh(farm);
  expect(batchCost(farm.db, cut.batchId).limeMicro).toBe(50_000);

  farm.wait(5 * DAY);
  // The product itself undoes after a day only for the owner.
  farm.write((write) => undoAct({ ...write, actor: { ...write.actor, role: 'owner' } }, groupId, 'Wrong rack'));
  refresh(farm);

  expect(batchCost(farm.db, cut.batchId).limeMicro).toBe(0);
});

it('when a use is entered late, only its month is worked out anew', async () => {
  const farm = await startFarm({ now: '2026-01-20T09:00:00Z' });
  const { systemId, rackId } = givenBench(farm);
  const cut = givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 10);
  farm.wait(50 * DAY);
  refresh(farm);
  const before = new Map(
    farm.db
      .select()
      .from(costMonths)
      .all()
      .map((row) => [row.month, row]),
  );

  farm.wait(1000);
  givenLimeUse(farm, systemId, 30, Date.parse('2026-02-10T12:00:00Z'));
  refresh(farm);

  const rebuilt = farm.db
    .select()
    .from(costMonths)
    .all()
    .filter((row) => before.get(row.month)?.builtAt !== row.builtAt);
  expect(rebuilt.map(({ month }) => month)).toEqual(['2026-02']);
  expect(batchCost(farm.db, cut.batchId).limeMicro).toBe(400_000);
});

it('when nothing changed, a second look writes nothing; the next day works the running month out again', async () => {
  const farm = await startFarm({ now: '2026-03-10T09:00:00Z' });
  const { systemId, rackId } = givenBench(farm);
  givenCut(farm, { pieces: 1, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 10);
  const builtAt = () =>
    farm.db
      .select()
      .from(costMonths)
      .all()
      .map((row) => row.builtAt);

  refresh(farm);
  const first = builtAt();
  farm.wait(1000);
  refresh(farm);
  const second = builtAt();
  farm.wait(DAY);
  refresh(farm);

  expect(second).toEqual(first);
  expect(builtAt()).not.toEqual(first);
});

it('when nothing stands in a system, its cost stays with the farm and is shown as such', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const { systemId } = givenBench(farm);
  givenLimeUse(farm, systemId, 50);
  const viewer = await farm.as('viewer');

  const reply = await viewer.get('/api/costs');

  expect(reply.status).toBe(200);
  expect(reply.body.months).toMatchObject([
    { month: '2026-03', limeMicro: 500_000, totalMicro: 500_000, unsharedMicro: 500_000, fragDays: 0 },
  ]);
  expect(farm.db.select().from(costShares).all()).toEqual([]);
});

it('when the farm looks at its costs, lines show what a living frag carries and its lime part', async () => {
  const farm = await startFarm({ now: '2026-03-02T09:00:00Z' });
  const { systemId, rackId } = givenBench(farm);
  const plugItemId = givenItem(farm, { kind: 'plug', unit: 'piece', strength: null });
  givenLot(farm, plugItemId, { quantity: 100, costMinor: 1000 });
  const cut = givenCut(farm, { pieces: 5, plugItemId, target: { kind: 'rack', rackId } });
  givenLimeUse(farm, systemId, 10);
  const grower = await farm.as('grower');

  const overview = await grower.get('/api/costs');
  const batch = await grower.get(`/api/costs/batches/${cut.batchId}`);
  const lines = await grower.get('/api/costs/export?table=lines');
  const months = await grower.get('/api/costs/export?table=months');

  expect(overview.body).toMatchObject({
    ...{ living: 5, perLivingMicro: 120_000, limePerLivingMicro: 20_000, cutPerLivingMicro: 100_000 },
    ...{ vinegarPerLivingMicro: 0, otherPerLivingMicro: 0, used: [{ kind: 'lime', costMicro: 100_000 }] },
  });
  expect(overview.body.lines).toMatchObject([{ batches: 1, living: 5, totalMicro: 600_000, perLivingMicro: 120_000 }]);
  expect(batch.body).toMatchObject({
    batchId: cut.batchId,
    totalMicro: 600_000,
    asOf: Date.parse('2026-03-02T09:00:00Z'),
  });
  expect(lines.text).toContain('per_living_frag_EUR');
  expect(lines.text).toContain(',1,5,0.6,0.12,0.02,0,0.1,0');
  expect(months.text).toContain('2026-03,');
});

it('when a farm is empty, its costs are empty and not an error', async () => {
  const farm = await startFarm();
  const owner = await farm.as('owner');

  const reply = await owner.get('/api/costs');

  expect(reply.body).toEqual({
    asOf: null,
    living: 0,
    perLivingMicro: null,
    limePerLivingMicro: null,
    vinegarPerLivingMicro: null,
    cutPerLivingMicro: null,
    otherPerLivingMicro: null,
    used: [],
    lines: [],
    months: [],
  });
});

it('when a batch is not known, the answer says so', async () => {
  const farm = await startFarm();
  const owner = await farm.as('owner');

  const unknown = await owner.get('/api/costs/batches/00000000-0000-4000-8000-00000000dead');
  const malformed = await owner.get('/api/costs/batches/1%27%20OR%201=1');

  expect([unknown.status, malformed.status]).toEqual([404, 400]);
});
