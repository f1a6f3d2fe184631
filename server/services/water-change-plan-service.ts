import { eq } from 'drizzle-orm';
import type { SetWaterChangePlan, WaterChangePlan } from '../../shared/contracts/water-change-plans.ts';
import { dayOf } from '../../shared/domain/days.ts';
import { DomainError } from '../../shared/errors.ts';
import { waterChangePlans } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { farmOf } from '../queries/farm.ts';
import { systemRow } from '../queries/systems.ts';
import { showWaterChangePlan } from '../queries/water-change-plans.ts';

/** Sets how often and how much water of a system is changed, in place of what was set before. */
export function setWaterChangePlan(write: Write, systemId: string, input: SetWaterChangePlan): WaterChangePlan {
  systemRow(write.tx, systemId);
  const before = planRow(write, systemId);
  const startOn = input.startOn ?? before?.startOn ?? dayOf(write.now, farmOf(write.tx).timeZone);
  const fields = {
    ...{ everyDays: input.everyDays, fraction: input.fraction, startOn },
    ...{ by: write.actor.name, updatedAt: write.now },
  };
  const after = write.tx
    .insert(waterChangePlans)
    .values({ systemId, ...fields })
    .onConflictDoUpdate({
      target: waterChangePlans.systemId,
      set: { ...fields, version: (before?.version ?? 0) + 1 },
    })
    .returning()
    .get();
  write.audit({
    ...{ action: 'water_change_plan.set', entity: 'water_change_plan', entityId: systemId, after },
    ...(before ? { before } : {}),
  });
  return showWaterChangePlan(write.tx, systemId, write.now);
}

/** @throws {DomainError} `record.not_found` where there is none */
export function clearWaterChangePlan(write: Write, systemId: string): void {
  const before = planRow(write, systemId);
  if (!before) throw new DomainError('record.not_found', 'This system has no such habit.');
  write.tx.delete(waterChangePlans).where(eq(waterChangePlans.systemId, systemId)).run();
  write.audit({ action: 'water_change_plan.cleared', entity: 'water_change_plan', entityId: systemId, before });
}

function planRow({ tx }: Write, systemId: string) {
  return tx.select().from(waterChangePlans).where(eq(waterChangePlans.systemId, systemId)).get();
}
