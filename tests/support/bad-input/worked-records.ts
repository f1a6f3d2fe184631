import { eq } from 'drizzle-orm';
import { picks, users } from '../../../server/db/schema/index.ts';
import { logDose } from '../../../server/services/dose-service.ts';
import { logWaterChange } from '../../../server/services/water-change-service.ts';
import { invite } from '../../../server/services/invitation-service.ts';
import { measureStock } from '../../../server/services/measure-stock.ts';
import { requestReset } from '../../../server/services/password-service.ts';
import { shipOrder } from '../../../server/services/ship-order.ts';
import { givenOffer, givenOrder, givenPacked, givenPaidOrder, givenPicked } from '../given-orders.ts';
import { givenCut, givenPlaced, givenRack, givenWithheld } from '../given-stock.ts';
import { givenItem, givenLot } from '../given-supplies.ts';
import { givenChangeOver, givenReading, givenRefill, givenReservoir, givenSystem, givenTank } from '../given-water.ts';
import { mailedToken } from '../mail-token.ts';
import type { TestFarm } from '../start-farm.ts';

/** A listed line and an order in each state from placed to shipped. */
export async function givenSales(farm: TestFarm) {
  const offer = givenOffer(farm, { pieces: 30 });
  const wanted = [{ offer, quantity: 2 }];
  const placed = givenOrder(farm, wanted);
  const paid = await givenPaidOrder(farm, wanted);
  const [picking, picked, packed, shipped] = [
    await givenPaidOrder(farm, wanted),
    await givenPaidOrder(farm, wanted),
    await givenPaidOrder(farm, wanted),
    await givenPaidOrder(farm, wanted),
  ];
  const codes = [...offer.codes];
  givenPicked(farm, picking.id, codes.splice(0, 1));
  for (const { id } of [picked, packed, shipped]) givenPicked(farm, id, codes.splice(0, 2));
  for (const { id } of [packed, shipped]) givenPacked(farm, id);
  farm.write((write) => shipOrder(write, shipped.id, { carrier: 'Night van', tracking: '' }));
  const pick = farm.db.select().from(picks).all()[0];
  return { ...offer, codes, placed, paid, picking, picked, packed, shipped, pickId: pick?.id };
}

/** A system with a tank, readings, a reservoir that is in use, a water change and a dose. */
export function givenWater(farm: TestFarm) {
  const systemId = givenSystem(farm);
  const supplementId = givenItem(farm, { kind: 'supplement', strength: 3 });
  givenLot(farm, supplementId);
  const reservoirId = givenReservoir(farm, systemId);
  givenRefill(farm, reservoirId);
  givenChangeOver(farm, reservoirId);
  const standbyId = givenReservoir(farm, systemId);
  const mixEventId = givenRefill(farm, standbyId).event.id;
  const dose = { systemId, itemId: supplementId, amount: 5, note: '' };
  return {
    ...{
      systemId,
      tankId: givenTank(farm, systemId),
      standbyId,
      mixEventId,
      supplementId,
      emptyId: givenReservoir(farm, systemId),
    },
    readingId: givenReading(farm, systemId, 8.2),
    changeId: farm.write((write) => logWaterChange(write, { systemId, litres: 10, alkalinityMeqL: 3, saltG: 0 })).id,
    doseId: farm.write((write) => logDose(write, dose)).id,
  };
}

/** A batch from the cut to a measurement, part of it on a rack and one plug kept from sale. */
export function givenStock(farm: TestFarm) {
  const { batchId, cutId, plugs } = givenCut(farm, { target: { kind: 'bench' } });
  const codes = plugs.map(({ code }) => code);
  const rackId = givenRack(farm);
  const fresh = givenCut(farm);
  return {
    ...{ batchId, codes, rackId },
    groupId: givenPlaced(farm, codes.splice(0, 2), rackId),
    withheldId: givenWithheld(farm, { plugCode: codes.pop() ?? '' }),
    measurementId: farm.write((write) => measureStock(write, { batchId, sizesMm: [20] })).ids[0],
    /** A cut of which nothing has moved since. */
    untouchedCutId: fresh.cutId,
    measuredCutId: cutId,
  };
}

/** Someone invited and someone who has forgotten the password, with the secrets of their mails. */
export async function givenPeople(farm: TestFarm) {
  const invitation = farm.write((write) => invite(write, { email: 'new@example.com', role: 'grower' }));
  const invitationToken = await mailedToken(farm, 'new@example.com');
  requestReset(farm.deps, 'sales@example.com');
  const resetToken = await mailedToken(farm, 'sales@example.com');
  const viewer = farm.db.select().from(users).where(eq(users.role, 'viewer')).get();
  return { invitationId: invitation.id, invitationToken, resetToken, viewerId: viewer?.id };
}
