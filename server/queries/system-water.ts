import { MS_PER_DAY } from '../../shared/domain/days.ts';
import type { WaterState } from '../../shared/domain/dose-effect.ts';
import { MEQ_PER_DKH, type ParameterCode } from '../../shared/domain/units.ts';
import type { Db } from '../db/client.ts';
import { latestReadings } from './readings.ts';

/** A part of the water that chemistry is worked out from. */
interface WaterPart {
  parameter: ParameterCode;
  field: keyof WaterState;
  /** What stands in where no recent test tells. */
  usual: number;
  /** How long a test holds: pH moves within hours, salt within weeks. */
  days: number;
}

/** Usual values of a reef farm (common practice, no source). */
const PARTS: readonly WaterPart[] = [
  { parameter: 'alkalinity', field: 'alkalinityMeqL', usual: 8 * MEQ_PER_DKH, days: 14 },
  { parameter: 'ph', field: 'phNbs', usual: 8.2, days: 3 },
  { parameter: 'calcium', field: 'calciumMgL', usual: 420, days: 60 },
  { parameter: 'salinity', field: 'salinity', usual: 35, days: 30 },
  { parameter: 'temperature', field: 'temperatureC', usual: 25.5, days: 30 },
];

export interface SystemWater {
  water: WaterState;
  parts: (WaterPart & { value: number; takenAt: number | null })[];
}

/** A system's water by its latest tests, with usual values for what was not tested lately. */
export function systemWater(db: Db, systemId: string, now: number): SystemWater {
  const latest = latestReadings(db, systemId);
  const parts = PARTS.map((part) => {
    const test = latest.find(({ parameter }) => parameter === part.parameter);
    const holds = test !== undefined && test.takenAt >= now - part.days * MS_PER_DAY;
    return { ...part, value: holds ? test.value : part.usual, takenAt: holds ? test.takenAt : null };
  });
  const valueOf = (field: keyof WaterState) => parts.find((part) => part.field === field)?.value ?? 0;
  return {
    parts,
    water: {
      ...{ alkalinityMeqL: valueOf('alkalinityMeqL'), phNbs: valueOf('phNbs'), calciumMgL: valueOf('calciumMgL') },
      ...{ salinity: valueOf('salinity'), temperatureC: valueOf('temperatureC') },
    },
  };
}
