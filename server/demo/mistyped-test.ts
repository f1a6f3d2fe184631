import { addDays } from '../../shared/domain/days.ts';
import { logReadings } from '../services/reading-service.ts';
import { timeOn, type World } from './world.ts';

/** A test of the afternoon whose figures were swapped: it is looked at again, found odd and left as it is. */
const MISTYPED = { systemCode: 'B', daysBefore: 12, minute: 16 * 60 + 20, dkh: 3.8 };

/** Puts the one test of the last weeks on the agenda that nobody believes. */
export function planMistypedTest({ agenda, systems, staff, truth, days }: World): void {
  const system = systems.find(({ spec }) => spec.code === MISTYPED.systemCode);
  if (!system || days.length <= MISTYPED.daysBefore) return;
  agenda.put(timeOn(addDays(truth.lastDay, -MISTYPED.daysBefore), MISTYPED.minute), staff.grower2, (write) => {
    const values = [{ parameter: 'alkalinity' as const, value: MISTYPED.dkh, unit: 'dKH', confirmed: true }];
    logReadings(write, { systemId: system.id, values, method: 'Photometer', note: '' });
  });
}
