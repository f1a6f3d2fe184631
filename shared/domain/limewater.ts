import { DomainError } from '../errors.ts';
import { ATOMIC_G_PER_MOL } from './atomic-weights.ts';
import { assertAboveZero, assertNotNegative, assertPurity, assertWithin } from './ranges.ts';

/** Molar masses, g/mol, from CIAAW abridged standard atomic weights. */
export const CALCIUM_HYDROXIDE_G_PER_MOL = 74.092;
const ACETIC_ACID_G_PER_MOL = 60.052;
export const CALCIUM_G_PER_MOL = ATOMIC_G_PER_MOL.Ca;

const SOLUBILITY_LIMITS = { min: 15, max: 30 } as const;

/**
 * Part of the stoichiometric extra lime that vinegar really dissolves: its calcium pushes some hydroxide back (common
 * ion). 0.85–0.89 by PHREEQC 3.8.9 with minteq.v4 and with Thermoddem, 20–30 °C and 2.5–20 mL/L of 5 % vinegar.
 */
const VINEGAR_YIELD = 0.87;

/** Household vinegar: grams of acetic acid in 100 mL. */
export const USUAL_ACID_PERCENT = 5;

/** Part of a lime powder that is calcium hydroxide where its label doesn't tell (grades run 0.88–0.97; common practice). */
export const USUAL_LIME_PURITY = 0.95;

export interface LimewaterMix {
  /** Powder weighed in, g. */
  limeG: number;
  /** Part of the powder that is calcium hydroxide, above 0 up to 1. */
  purity: number;
  waterL: number;
  temperatureC: number;
  vinegarMl: number;
  /** Acidity of the vinegar, % w/v; 5 when left out. */
  acidPercent?: number;
}

export interface LimewaterResult {
  /** Calcium hydroxide in solution, g. */
  dissolvedG: number;
  /** Calcium hydroxide that settles, g; the powder's other solids are not counted. */
  undissolvedG: number;
  /** Alkalinity each litre brings in the end, when bacteria have oxidised the acetate, meq/L. */
  alkalinityMeqL: number;
  /** Alkalinity each litre brings at once, meq/L. */
  alkalinityNowMeqL: number;
  calciumMgL: number;
  /** Dissolved part of what this water and vinegar can hold, 0 to 1. */
  saturation: number;
  /** What more strength would take: more lime, or more room to dissolve it. */
  shortOf: 'lime' | 'solubility';
  /** False where the water alone would have dissolved all the lime: the vinegar is then only a carbon dose. */
  vinegarHelps: boolean;
  /** Powder that would just saturate this water and vinegar, g. */
  limeToSaturateG: number;
}

/**
 * Solubility of calcium hydroxide in pure water; it falls as the water warms.
 *
 * @param temperatureC °C, 15–30
 * @returns g/L
 * @throws {DomainError} `domain.out_of_range`
 * @see Bates, Bower & Smith 1956, J. Res. NBS 56:305 (0.0203 mol/L at 25 °C); slope by PHREEQC with Thermoddem
 */
export function limeSolubility(temperatureC: number): number {
  assertWithin('Water temperature (°C)', temperatureC, SOLUBILITY_LIMITS.min, SOLUBILITY_LIMITS.max);
  return 1.493 - 0.0089 * (temperatureC - 25);
}

/**
 * What a batch of limewater dissolves and how strong the clear part gets.
 *
 * @throws {DomainError} `domain.out_of_range` for amounts that make no mix, and where the vinegar would use up all the
 *   lime, since the clear solution must stay alkaline
 */
export function mixLimewater(mix: LimewaterMix): LimewaterResult {
  assertMix(mix);
  assertNotNegative('Lime (g)', mix.limeG);
  const limeMol = (mix.limeG * mix.purity) / CALCIUM_HYDROXIDE_G_PER_MOL;
  const acidMol = acidIn(mix);
  assertStaysAlkaline(limeMol, acidMol);
  const { waterMol, totalMol: roomMol } = roomFor(mix);
  const dissolvedMol = Math.min(limeMol, roomMol);
  return {
    dissolvedG: dissolvedMol * CALCIUM_HYDROXIDE_G_PER_MOL,
    undissolvedG: (limeMol - dissolvedMol) * CALCIUM_HYDROXIDE_G_PER_MOL,
    alkalinityMeqL: (2000 * dissolvedMol) / mix.waterL,
    alkalinityNowMeqL: (1000 * (2 * dissolvedMol - acidMol)) / mix.waterL,
    calciumMgL: (1000 * dissolvedMol * CALCIUM_G_PER_MOL) / mix.waterL,
    saturation: dissolvedMol / roomMol,
    shortOf: limeMol < roomMol ? 'lime' : 'solubility',
    vinegarHelps: acidMol > 0 && limeMol > waterMol,
    limeToSaturateG: (roomMol * CALCIUM_HYDROXIDE_G_PER_MOL) / mix.purity,
  };
}

/**
 * Powder for limewater of a wanted strength, g.
 *
 * @param wanted strength counted as in `alkalinityMeqL` of a mix
 * @throws {DomainError} `domain.out_of_range` where this water and vinegar cannot hold so much
 */
export function limeForStrength(wanted: Omit<LimewaterMix, 'limeG'> & { alkalinityMeqL: number }): number {
  const { alkalinityMeqL, waterL, purity } = wanted;
  assertMix(wanted);
  assertNotNegative('Strength (meq/L)', alkalinityMeqL);
  const roomMol = roomFor(wanted).totalMol;
  const neededMol = (alkalinityMeqL * waterL) / 2000;
  if (neededMol > roomMol * (1 + 1e-12)) {
    const strongest = (2000 * roomMol) / waterL;
    throw new DomainError(
      'domain.out_of_range',
      `This water holds at most ${strongest.toFixed(1)} meq/L. Ask for less, use cooler water or add vinegar.`,
      { details: { alkalinityMeqL, strongest } },
    );
  }
  assertStaysAlkaline(neededMol, acidIn(wanted));
  return (neededMol * CALCIUM_HYDROXIDE_G_PER_MOL) / purity;
}

/** Powder in each litre of limewater of a strength, all of it dissolved, g. */
export function limeGPerLOf(alkalinityMeqL: number, purity: number): number {
  assertPurity(purity);
  return (alkalinityMeqL * CALCIUM_HYDROXIDE_G_PER_MOL) / 2000 / purity;
}

/**
 * Strength of what stands in a reservoir after new mix joins what was left, meq/L; zero when empty.
 */
export function blendStrength(parts: readonly { litres: number; alkalinityMeqL: number }[]): number {
  const litres = parts.reduce((sum, part) => sum + part.litres, 0);
  const alkalinityMeq = parts.reduce((sum, part) => sum + part.litres * part.alkalinityMeqL, 0);
  return litres > 0 ? alkalinityMeq / litres : 0;
}

/**
 * The most that limewater can bring to a system, since it only replaces evaporated water.
 *
 * @returns meq/L a day
 */
export function limewaterCeiling(evaporationLPerDay: number, alkalinityMeqL: number, systemVolumeL: number): number {
  assertNotNegative('Evaporation (L a day)', evaporationLPerDay);
  assertNotNegative('Strength (meq/L)', alkalinityMeqL);
  assertAboveZero('System volume (L)', systemVolumeL);
  return (evaporationLPerDay * alkalinityMeqL) / systemVolumeL;
}

/**
 * What a millilitre of vinegar holds and lets dissolve.
 *
 * @param acidPercent acidity, % w/v, 0–100
 * @returns acid, and calcium hydroxide beyond what the water alone dissolves, mol
 */
export function strengthOfVinegar(acidPercent: number): { acidMolPerMl: number; roomMolPerMl: number } {
  assertWithin('Acidity (%)', acidPercent, 0, 100);
  const acidMolPerMl = acidPercent / 100 / ACETIC_ACID_G_PER_MOL;
  return { acidMolPerMl, roomMolPerMl: VINEGAR_YIELD * (acidMolPerMl / 2) };
}

function acidIn({ vinegarMl, acidPercent = USUAL_ACID_PERCENT }: { vinegarMl: number; acidPercent?: number }): number {
  return vinegarMl * strengthOfVinegar(acidPercent).acidMolPerMl;
}

function roomFor(mix: Omit<LimewaterMix, 'limeG'>): { waterMol: number; totalMol: number } {
  const waterMol = (limeSolubility(mix.temperatureC) * mix.waterL) / CALCIUM_HYDROXIDE_G_PER_MOL;
  return { waterMol, totalMol: waterMol + VINEGAR_YIELD * (acidIn(mix) / 2) };
}

function assertMix(mix: Omit<LimewaterMix, 'limeG'>): void {
  assertAboveZero('Water (L)', mix.waterL);
  assertNotNegative('Vinegar (mL)', mix.vinegarMl);
  assertWithin('Acidity (%)', mix.acidPercent ?? USUAL_ACID_PERCENT, 0, 100);
  assertPurity(mix.purity);
}

/** Each mole of lime neutralises two of acid; the clear solution must stay alkaline. */
function assertStaysAlkaline(limeMol: number, acidMol: number): void {
  if (acidMol === 0 || 2 * limeMol > acidMol) return;
  throw new DomainError(
    'domain.out_of_range',
    'The vinegar would use up all the lime. Use less vinegar or more lime.',
    {
      details: { limeMol, acidMol },
    },
  );
}
