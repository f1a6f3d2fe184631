import type { SystemPlan } from '../../shared/contracts/plan.ts';
import { MS_PER_DAY } from '../../shared/domain/days.ts';
import { MEQ_PER_DKH } from '../../shared/domain/units.ts';
import { givenItem, givenLot } from './given-supplies.ts';
import { givenChangeOver, givenLevel, givenReading, givenRefill, givenReservoir, givenSystem } from './given-water.ts';
import type { TestClient, TestFarm } from './start-farm.ts';

const DAYS = 18;

export interface DosedOptions {
  limeItemId: string;
  fromDkh?: number;
  perDayDkh?: number;
}

export interface DosedSystem {
  systemId: string;
  onlineId: string;
  standbyId: string;
}

/** Lime, vinegar and a supplement that raises alkalinity, with prices. */
export function givenMeans(farm: TestFarm): { limeId: string; supplementId: string } {
  const limeId = givenItem(farm, { kind: 'lime', strength: 0.95 });
  const vinegarId = givenItem(farm, { kind: 'vinegar', unit: 'mL', strength: 5 });
  const supplementId = givenItem(farm, { kind: 'supplement', unit: 'mL', strength: 1.9 });
  for (const itemId of [limeId, vinegarId, supplementId]) givenLot(farm, itemId, { quantity: 20_000, costMinor: 9000 });
  return { limeId, supplementId };
}

/**
 * A system of 1,000 L that has drawn 5 L of limewater a day for 18 days, with a daily test that moves by as much as is
 * said, and a standby that is empty. Its lime must be among the supplies.
 */
export function givenDosedSystem(
  farm: TestFarm,
  { fromDkh = 8.4, perDayDkh = -0.1, limeItemId }: DosedOptions,
): DosedSystem {
  const now = farm.deps.clock.now();
  const at = (daysAgo: number) => now - daysAgo * MS_PER_DAY;
  const systemId = givenSystem(farm, {
    bands: [{ parameter: 'alkalinity', low: 6 * MEQ_PER_DKH, high: 10 * MEQ_PER_DKH }],
  });
  const onlineId = givenReservoir(farm, systemId, { volumeL: 120 });
  const standbyId = givenReservoir(farm, systemId, { volumeL: 100 });
  givenRefill(farm, onlineId, { waterL: 110, limeG: 80, limeItemId, at: at(DAYS + 1) });
  givenChangeOver(farm, onlineId, at(DAYS));
  for (let day = 1; day <= DAYS; day += 1) {
    givenLevel(farm, onlineId, 110 - 5 * day, at(DAYS - day));
    givenReading(farm, systemId, fromDkh + perDayDkh * day, { takenAt: at(DAYS - day) });
  }
  givenReading(farm, systemId, 8.2, { parameter: 'ph', unit: 'pH', takenAt: at(0.1) });
  return { systemId, onlineId, standbyId };
}

export async function planOf(client: TestClient, systemId: string): Promise<SystemPlan> {
  const reply = await client.get(`/api/systems/${systemId}/plan`);
  if (reply.status !== 200) throw new Error(`No plan: ${JSON.stringify(reply.body)}`);
  return reply.body as SystemPlan;
}
