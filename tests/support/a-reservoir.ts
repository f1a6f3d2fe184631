import { eq } from 'drizzle-orm';
import { reservoirs } from '../../server/db/schema/index.ts';
import { givenItem, givenLot } from './given-supplies.ts';
import { givenReservoir, givenSystem } from './given-water.ts';
import { startFarm, type TestFarm } from './start-farm.ts';

/** A reservoir of 60 L and 400 mm with its intake at 40 mm, so that 6 L are never drawn. */
export async function aReservoir() {
  const farm = await startFarm();
  const lime = givenItem(farm, { name: 'Lime', kind: 'lime', strength: 0.95 });
  const vinegar = givenItem(farm, { name: 'Vinegar', kind: 'vinegar', unit: 'mL', strength: 5 });
  givenLot(farm, lime, { quantity: 1000, costMinor: 800 });
  givenLot(farm, vinegar, { quantity: 5000, costMinor: 500 });
  const systemId = givenSystem(farm, { netVolumeL: 2000 });
  const reservoirId = givenReservoir(farm, systemId, { heightMm: 400, intakeMm: 40 });
  const grower = await farm.as('grower');
  const act = async (path: string, body: object) => {
    // A session ends within the days that these tests let pass.
    const signedIn = await farm.as('grower');
    return signedIn.post(`/api/reservoirs/${reservoirId}/${path}`).send(body);
  };
  return { farm, lime, systemId, reservoirId, grower, act };
}

export function reservoirIn(farm: TestFarm, reservoirId: string) {
  return farm.db.select().from(reservoirs).where(eq(reservoirs.id, reservoirId)).get();
}
