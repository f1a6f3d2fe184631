import fc from 'fast-check';
import { expect, it } from 'vitest';
import { type reservoirEvents } from '../../../server/db/schema/index.ts';
import { systemUse } from '../../../server/queries/reservoir-use.ts';
import { eventsInOrder, reservoirRow } from '../../../server/queries/reservoirs.ts';
import { refillReservoir } from '../../../server/services/refill-service.ts';
import { changeOver } from '../../../server/services/reservoir-changeover.ts';
import {
  checkStrength,
  cleanReservoir,
  logLevel,
  markSpent,
  removeSludge,
  topUp,
} from '../../../server/services/reservoir-service.ts';
import { givenItem, givenLot } from '../../support/given-supplies.ts';
import { givenReservoir, givenSystem } from '../../support/given-water.ts';
import { startFarm, type TestFarm } from '../../support/start-farm.ts';

const VOLUME = 60;
type EventRow = typeof reservoirEvents.$inferSelect;

/** What can be done to a reservoir; `part` says how much of what may be moved. */
const KINDS = ['mix', 'topUp', 'level', 'online', 'sludge', 'spent', 'clean', 'check'] as const;
const anAct = fc.record({ kind: fc.constantFrom(...KINDS), part: fc.double({ min: 0.01, max: 0.99, noNaN: true }) });

function play(
  farm: TestFarm,
  reservoirId: string,
  { kind, part }: { kind: (typeof KINDS)[number]; part: number },
): void {
  const { levelL, state } = reservoirRow(farm.db, reservoirId);
  const room = VOLUME - levelL;
  const note = '';
  farm.write((write) => {
    if (kind === 'mix' && room > 1) {
      const mix = { waterL: room * part, limeG: 20 * part, vinegarMl: 0, temperatureC: 25, note };
      refillReservoir(write, reservoirId, mix);
    }
    if (kind === 'topUp' && room > 1) topUp(write, reservoirId, { waterL: room * part, note });
    // Only what is online is drawn; elsewhere a level stands.
    if (kind === 'level' && state === 'online') logLevel(write, reservoirId, { levelL: levelL * part, note });
    if (kind === 'online' && state !== 'online' && levelL > 0) changeOver(write, reservoirId, { note });
    if (kind === 'sludge') removeSludge(write, reservoirId, { levelL: levelL * part, note });
    if (kind === 'spent' && state !== 'spent') markSpent(write, reservoirId, { note });
    if (kind === 'clean' && state !== 'online') cleanReservoir(write, reservoirId, { note });
    if (kind === 'check' && levelL > 0) {
      checkStrength(write, reservoirId, { conductivityMsCm: 10 * part, freshMsCm: 10, note });
    }
  });
}

/** What an event brought in from outside (positive) or threw out, apart from use, as litres and meq. */
function movedBy(event: EventRow, strengthBefore: number): { litres: number; meq: number } {
  return {
    litres: ADDS.has(event.kind) ? event.levelL - event.levelBeforeL : 0,
    meq: ADDS.has(event.kind) ? event.levelL * event.alkalinityMeqL - event.levelBeforeL * strengthBefore : 0,
  };
}
const ADDS: ReadonlySet<EventRow['kind']> = new Set(['refill', 'topped_up', 'sludge_removed', 'cleaned', 'strength']);

it('litres and alkalinity in are what was used, what was thrown out or lost to air, and what stands', async () => {
  const farm = await startFarm();
  const lime = givenItem(farm, { name: 'Lime', kind: 'lime', strength: 0.95 });
  givenLot(farm, lime, { quantity: 1_000_000, costMinor: 800 });

  fc.assert(
    fc.property(fc.array(anAct, { minLength: 1, maxLength: 14 }), (acts) => {
      const systemId = givenSystem(farm);
      const reservoirId = givenReservoir(farm, systemId, { volumeL: VOLUME });
      for (const act of acts) {
        farm.wait(3_600_000);
        play(farm, reservoirId, act);
      }

      const events = eventsInOrder(farm.db, reservoirId);
      const moved = events.map((event, index) => movedBy(event, events[index - 1]?.alkalinityMeqL ?? 0));
      const used = systemUse(farm.db, systemId, farm.deps.clock.now(), 30).flatMap(({ intervals }) => intervals);
      const standing = reservoirRow(farm.db, reservoirId);
      const sum = (parts: readonly number[]) => parts.reduce((total, part) => total + part, 0);
      expect(sum(moved.map(({ litres }) => litres))).toBeCloseTo(
        sum(used.map(({ litres }) => litres)) + standing.levelL,
        6,
      );
      expect(sum(moved.map(({ meq }) => meq))).toBeCloseTo(
        sum(used.map(({ alkalinityMeq }) => alkalinityMeq)) + standing.levelL * standing.alkalinityMeqL,
        6,
      );
      // Neither plain water nor a look makes or loses alkalinity.
      events.forEach((event, index) => {
        if (event.kind === 'topped_up') expect(moved[index]?.meq).toBeCloseTo(0, 6);
      });
    }),
    { numRuns: 40 },
  );
});
