import { MEQ_PER_DKH } from './water.ts';

export const PARAMETER_CODES = [
  'alkalinity',
  'calcium',
  'magnesium',
  'salinity',
  'temperature',
  'ph',
  'nitrate',
  'phosphate',
] as const;

export type ParameterCode = (typeof PARAMETER_CODES)[number];

/** A property of the water that a farm tests. All figures are in the canonical unit. */
export interface Parameter {
  code: ParameterCode;
  /** The quantity whose units it can be shown in; each parameter has its own. */
  quantity: ParameterCode;
  label: string;
  unit: string;
  /** A reading outside is a slip of the pen or the wrong unit, and is refused. */
  plausible: { min: number; max: number };
  /** Where a new farm's target band starts; every farm sets its own. */
  band: { min: number; max: number };
  /** Standard deviation of one test by a usual method, until the farm has checked its own. */
  testSd: number;
  decimals: number;
}

/**
 * The eight readings. Bands and test errors are starting defaults of common practice (no source), for a farm to
 * overwrite: alkalinity 7.5–9 dKH with a photometer's ±0.3 dKH taken as two standard deviations.
 */
export const PARAMETERS: readonly Parameter[] = [
  {
    ...{ code: 'alkalinity', quantity: 'alkalinity', label: 'Alkalinity', unit: 'meq/L', decimals: 2 },
    ...{ plausible: { min: 0.3, max: 10 }, band: { min: 7.5 * MEQ_PER_DKH, max: 9 * MEQ_PER_DKH } },
    testSd: 0.15 * MEQ_PER_DKH,
  },
  {
    ...{ code: 'calcium', quantity: 'calcium', label: 'Calcium', unit: 'mg/L', decimals: 0 },
    ...{ plausible: { min: 100, max: 900 }, band: { min: 400, max: 460 } },
    testSd: 10,
  },
  {
    ...{ code: 'magnesium', quantity: 'magnesium', label: 'Magnesium', unit: 'mg/L', decimals: 0 },
    ...{ plausible: { min: 400, max: 2500 }, band: { min: 1280, max: 1420 } },
    testSd: 30,
  },
  {
    ...{ code: 'salinity', quantity: 'salinity', label: 'Salinity', unit: 'ppt', decimals: 1 },
    ...{ plausible: { min: 5, max: 42 }, band: { min: 34, max: 36 } },
    testSd: 0.3,
  },
  {
    ...{ code: 'temperature', quantity: 'temperature', label: 'Temperature', unit: 'C', decimals: 1 },
    ...{ plausible: { min: 5, max: 40 }, band: { min: 25, max: 26.5 } },
    testSd: 0.2,
  },
  {
    ...{ code: 'ph', quantity: 'ph', label: 'pH', unit: 'pH', decimals: 2 },
    ...{ plausible: { min: 6, max: 10 }, band: { min: 8, max: 8.4 } },
    testSd: 0.05,
  },
  {
    ...{ code: 'nitrate', quantity: 'nitrate', label: 'Nitrate', unit: 'mg/L', decimals: 1 },
    ...{ plausible: { min: 0, max: 500 }, band: { min: 2, max: 15 } },
    testSd: 1,
  },
  {
    ...{ code: 'phosphate', quantity: 'phosphate', label: 'Phosphate', unit: 'mg/L', decimals: 3 },
    ...{ plausible: { min: 0, max: 10 }, band: { min: 0.03, max: 0.1 } },
    testSd: 0.02,
  },
];
