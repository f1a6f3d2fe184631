import { USUAL_ROOM_PCO2_UATM } from '@shared/domain/dose-effect.ts';
import { USUAL_ACID_PERCENT, USUAL_LIME_PURITY } from '@shared/domain/limewater.ts';
import { MEQ_PER_DKH, type Quantity } from '@shared/domain/units.ts';

/** A number that a person puts on the bench. It keeps its value from one calculator to the next. */
interface BenchField {
  label: string;
  /** The quantity whose unit the person chose; else `unit` is only shown. */
  quantity?: Quantity;
  unit?: string;
  /** Where the bench starts: usual reef water and a middling system. */
  start: number;
}

const FIELDS = {
  salinity: { label: 'Salinity', quantity: 'salinity', start: 35 },
  temperatureC: { label: 'Temperature', quantity: 'temperature', start: 25 },
  alkalinityMeqL: { label: 'Alkalinity', quantity: 'alkalinity', start: 8 * MEQ_PER_DKH },
  calciumMgL: { label: 'Calcium', quantity: 'calcium', start: 420 },
  magnesiumMgL: { label: 'Magnesium', quantity: 'magnesium', start: 1350 },
  phosphateMgL: { label: 'Phosphate', quantity: 'phosphate', start: 0 },
  ph: { label: 'pH', start: 8.2 },
  dicUmolKg: { label: 'Inorganic carbon', unit: 'µmol/kg', start: 2300 },
  pco2Uatm: { label: 'CO₂ of the water', unit: 'µatm', start: 450 },
  roomPco2Uatm: { label: 'CO₂ of the room', unit: 'µatm', start: USUAL_ROOM_PCO2_UATM },
  volumeL: { label: 'System volume', quantity: 'volume', start: 1000 },
  reading: { label: 'Reading', start: 53.1 },
  amount: { label: 'Amount', start: 8 },
  waterL: { label: 'Fresh water', quantity: 'volume', start: 100 },
  limeG: { label: 'Lime, weighed', quantity: 'mass', start: 170 },
  purityPercent: { label: 'Hydroxide in it', unit: '%', start: USUAL_LIME_PURITY * 100 },
  vinegarMl: { label: 'Vinegar', quantity: 'liquid', start: 0 },
  acidPercent: { label: 'Acidity of the vinegar', unit: '%', start: USUAL_ACID_PERCENT },
  mixTemperatureC: { label: 'Temperature of the mix', quantity: 'temperature', start: 25 },
  strengthMeqL: { label: 'Its strength', quantity: 'alkalinity', start: 40 },
  limewaterL: { label: 'Limewater', quantity: 'volume', start: 4 },
  powderG: { label: 'Powder', quantity: 'mass', start: 10 },
  evaporationLPerDay: { label: 'Evaporation a day', quantity: 'volume', start: 10 },
  demandMeqL: { label: 'Corals take a day', quantity: 'alkalinity', start: 0.3 },
  wantedAlkalinityMeqL: { label: 'Wanted', quantity: 'alkalinity', start: 9 * MEQ_PER_DKH },
  wantedCalciumMgL: { label: 'Wanted', quantity: 'calcium', start: 440 },
  wantedMagnesiumMgL: { label: 'Wanted', quantity: 'magnesium', start: 1400 },
  dailyAlkalinityMeqL: { label: 'At most a day', quantity: 'alkalinity', start: 0.5 * MEQ_PER_DKH },
  dailyCalciumMgL: { label: 'At most a day', quantity: 'calcium', start: 20 },
  dailyMagnesiumMgL: { label: 'At most a day', quantity: 'magnesium', start: 50 },
} as const satisfies Record<string, BenchField>;

export type BenchNumber = keyof typeof FIELDS;
export const BENCH_FIELDS: Readonly<Record<BenchNumber, BenchField>> = FIELDS;
export const BENCH_NUMBERS = Object.keys(FIELDS) as BenchNumber[]; // the keys of the table are the names

/** What is chosen from lists; the first is where the bench starts. */
export const BENCH_CHOICES = {
  tool: ['carbonate', 'dose', 'overfill', 'correction', 'limewater', 'ceiling', 'salinity', 'units'],
  pair: ['alkalinity-ph', 'alkalinity-dic', 'alkalinity-pco2', 'dic-ph', 'dic-pco2', 'ph-pco2'],
  phScale: ['nbs', 'total', 'sws', 'free'],
  boron: ['uppstrom1974', 'lee2010'],
  dosed: ['limewater', 'sodium_bicarbonate', 'sodium_carbonate'],
  topOff: ['replaces', 'adds'],
  readIn: ['mS/cm', 'sg', 'sg 60F', 'sg 20/4', 'ppt'],
  raised: ['alkalinity', 'calcium', 'magnesium'],
  alkalinityPowder: ['sodium_bicarbonate', 'baked_bicarbonate', 'sodium_carbonate'],
  calciumPowder: ['calcium_chloride_dihydrate', 'calcium_chloride_anhydrous'],
  magnesiumPowder: ['magnesium_chloride_hexahydrate', 'magnesium_sulfate_heptahydrate'],
  quantity: ['alkalinity', 'calcium', 'magnesium', 'potassium', 'strontium', 'nitrate', 'phosphate'],
  unit: ['dKH', 'meq/L', 'ppm', 'umol/kg', 'mg/L', 'mmol/L', 'mg/L N', 'ug/L P'],
} as const;

export type BenchChoice = keyof typeof BENCH_CHOICES;
export type BenchChoices = { -readonly [Choice in BenchChoice]: (typeof BENCH_CHOICES)[Choice][number] };
export type BenchTool = BenchChoices['tool'];
