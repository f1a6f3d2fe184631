import { SD_PER_HALF_INTERVAL, testErrorOf } from './test-error.ts';
import { toCanonical, type ParameterCode } from './units.ts';

/** A method that many farms use, with the error that it is known for; canonical unit but for `unit` itself. */
export interface UsualMethod {
  parameter: ParameterCode;
  name: string;
  /** The unit that the tester reads. */
  unit: string;
  repeatabilitySd: number;
  /** Smallest step that it shows. */
  resolution: number;
}

/** Where the figures of a usual method are from, in the words that are shown with it. */
export const USUAL_METHOD_SOURCE = 'Common practice, no source.';

/**
 * Methods that a new farm starts with. Their errors are common practice, no source: half-widths of 95 % in the unit that
 * is read (a refractometer is read to half a part per thousand, a colour chart to the next field). Those of alkalinity
 * are the ones that readings with the same words have.
 */
export const USUAL_METHODS: readonly UsualMethod[] = [
  ...['Photometer', 'Titration', 'Drop count'].map((name) => ({
    ...{ parameter: 'alkalinity' as const, name, unit: 'dKH' },
    repeatabilitySd: testErrorOf('alkalinity', name).sd,
    resolution: toCanonical('alkalinity', name === 'Drop count' ? 0.5 : 0.1, 'dKH'),
  })),
  usual('calcium', 'Titration', 'mg/L', 20, 5),
  usual('magnesium', 'Titration', 'mg/L', 60, 10),
  usual('salinity', 'Conductivity meter', 'ppt', 0.5, 0.1),
  usual('salinity', 'Refractometer', 'ppt', 1, 0.5),
  usual('temperature', 'Thermometer', 'C', 0.4, 0.1),
  usual('ph', 'pH meter', 'pH', 0.1, 0.01),
  usual('nitrate', 'Photometer', 'mg/L', 2, 0.1),
  usual('nitrate', 'Colour chart', 'mg/L', 5, 2.5),
  usual('phosphate', 'Photometer', 'mg/L', 0.04, 0.01),
];

function usual(
  parameter: Exclude<ParameterCode, 'alkalinity'>,
  name: string,
  unit: string,
  half: number,
  resolution: number,
): UsualMethod {
  return { parameter, name, unit, repeatabilitySd: half / SD_PER_HALF_INTERVAL, resolution };
}
