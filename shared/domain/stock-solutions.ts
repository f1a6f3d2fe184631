import { ATOMIC_G_PER_MOL } from './atomic-weights.ts';
import { assertAboveZero, assertPurity } from './ranges.ts';

type Element = keyof typeof ATOMIC_G_PER_MOL;

export const POWDER_CODES = [
  'sodium_bicarbonate',
  'baked_bicarbonate',
  'sodium_carbonate',
  'calcium_chloride_dihydrate',
  'calcium_chloride_anhydrous',
  'magnesium_chloride_hexahydrate',
  'magnesium_sulfate_heptahydrate',
] as const;
export type PowderCode = (typeof POWDER_CODES)[number];

/** A salt that stock solutions are made from. */
export interface Powder {
  label: string;
  formula: string;
  /** Atoms of one formula unit. */
  atoms: Partial<Record<Element, number>>;
  /** Equivalents of alkalinity of one mole. */
  alkalinityEq: number;
  /** Grams that a litre of cold water (20 °C) still dissolves; handbook figures, from memory, so about ±10 %. */
  solubilityGPerL: number;
}

const BICARBONATE = { Na: 1, H: 1, C: 1, O: 3 } as const;

/** The usual salts. Weigh baked bicarbonate before it is baked: heat drives out water and half of its CO2. */
export const POWDERS: Record<PowderCode, Powder> = {
  sodium_bicarbonate: {
    ...{ label: 'Sodium bicarbonate', formula: 'NaHCO3', atoms: BICARBONATE },
    ...{ alkalinityEq: 1, solubilityGPerL: 96 },
  },
  baked_bicarbonate: {
    ...{ label: 'Sodium bicarbonate, baked', formula: 'NaHCO3, weighed before baking', atoms: BICARBONATE },
    // As the sodium carbonate that is left of it: 215 g/L, and 168 g weighed make 106 g.
    ...{ alkalinityEq: 1, solubilityGPerL: 340 },
  },
  sodium_carbonate: {
    ...{ label: 'Sodium carbonate', formula: 'Na2CO3', atoms: { Na: 2, C: 1, O: 3 } },
    ...{ alkalinityEq: 2, solubilityGPerL: 215 },
  },
  calcium_chloride_dihydrate: {
    ...{ label: 'Calcium chloride dihydrate', formula: 'CaCl2·2H2O', atoms: { Ca: 1, Cl: 2, H: 4, O: 2 } },
    ...{ alkalinityEq: 0, solubilityGPerL: 980 },
  },
  calcium_chloride_anhydrous: {
    ...{ label: 'Calcium chloride, anhydrous', formula: 'CaCl2', atoms: { Ca: 1, Cl: 2 } },
    ...{ alkalinityEq: 0, solubilityGPerL: 740 },
  },
  magnesium_chloride_hexahydrate: {
    ...{ label: 'Magnesium chloride hexahydrate', formula: 'MgCl2·6H2O', atoms: { Mg: 1, Cl: 2, H: 12, O: 6 } },
    ...{ alkalinityEq: 0, solubilityGPerL: 1600 },
  },
  magnesium_sulfate_heptahydrate: {
    ...{ label: 'Magnesium sulfate heptahydrate', formula: 'MgSO4·7H2O', atoms: { Mg: 1, S: 1, H: 14, O: 11 } },
    ...{ alkalinityEq: 0, solubilityGPerL: 710 },
  },
};

/** What an amount of a supplement brings to the water. */
export interface Brings {
  alkalinityMeq: number;
  calciumMg: number;
  magnesiumMg: number;
}

/** One powder of a recipe. */
export interface RecipePart {
  powder: PowderCode;
  /** As weighed, g. */
  grams: number;
  /** Part of the powder that is the salt, above 0 up to 1. */
  purity: number;
}

/** Molar mass of a powder, g/mol. */
export function powderMolarMass(powder: PowderCode): number {
  return (Object.entries(POWDERS[powder].atoms) as [Element, number][]).reduce(
    (sum, [element, count]) => sum + ATOMIC_G_PER_MOL[element] * count,
    0,
  );
}

/** What one gram of the pure salt brings: alkalinity in meq, calcium and magnesium in mg. */
export function powderBrings(powder: PowderCode): Brings {
  const { alkalinityEq, atoms } = POWDERS[powder];
  const mmol = 1000 / powderMolarMass(powder);
  return {
    alkalinityMeq: alkalinityEq * mmol,
    calciumMg: (atoms.Ca ?? 0) * ATOMIC_G_PER_MOL.Ca * mmol,
    magnesiumMg: (atoms.Mg ?? 0) * ATOMIC_G_PER_MOL.Mg * mmol,
  };
}

/**
 * Strength of a stock solution when all of its powders have dissolved.
 *
 * @param litres final volume: powders are dissolved in less water and filled up to it
 * @returns what one litre of it brings
 * @throws {DomainError} `domain.out_of_range`
 */
export function solutionStrength(parts: readonly RecipePart[], litres: number): Brings {
  assertAboveZero('Final volume (L)', litres);
  const strength: Brings = { alkalinityMeq: 0, calciumMg: 0, magnesiumMg: 0 };
  for (const { powder, grams, purity } of parts) {
    assertAboveZero('Powder (g)', grams);
    assertPurity(purity);
    const brings = powderBrings(powder);
    const perL = (grams * purity) / litres;
    strength.alkalinityMeq += brings.alkalinityMeq * perL;
    strength.calciumMg += brings.calciumMg * perL;
    strength.magnesiumMg += brings.magnesiumMg * perL;
  }
  return strength;
}

/**
 * Grams of a powder for a wanted amount of what it brings.
 *
 * @param amount meq of alkalinity, or mg of calcium or magnesium
 * @returns grams as weighed; null where the powder brings none of it
 */
export function powderFor(powder: PowderCode, brings: keyof Brings, amount: number, purity = 1): number | null {
  assertPurity(purity);
  const perG = powderBrings(powder)[brings] * purity;
  return perG > 0 ? amount / perG : null;
}

/** Why powders must not share one solution; null where they may. */
export function recipeConflict(powders: readonly PowderCode[]): string | null {
  const brings = powders.map(powderBrings);
  const hasAlkalinity = brings.some(({ alkalinityMeq }) => alkalinityMeq > 0);
  const hasCalcium = brings.some(({ calciumMg }) => calciumMg > 0);
  const hasMagnesium = brings.some(({ magnesiumMg }) => magnesiumMg > 0);
  const hasSulfate = powders.some((powder) => POWDERS[powder].atoms.S !== undefined);
  if (hasAlkalinity && (hasCalcium || hasMagnesium)) {
    return 'Alkalinity and calcium or magnesium turn to chalk in one bottle. Make a solution of each.';
  }
  if (hasCalcium && hasSulfate) return 'Calcium and sulfate turn to gypsum in one bottle. Make a solution of each.';
  return null;
}

/** The powders of a recipe that are more than cold water dissolves, with how much that is, g/L. */
export function undissolvedParts(
  parts: readonly RecipePart[],
  litres: number,
): { powder: PowderCode; gramsPerL: number; solubilityGPerL: number }[] {
  assertAboveZero('Final volume (L)', litres);
  return parts.flatMap(({ powder, grams }) => {
    const gramsPerL = grams / litres;
    const { solubilityGPerL } = POWDERS[powder];
    return gramsPerL > solubilityGPerL ? [{ powder, gramsPerL, solubilityGPerL }] : [];
  });
}
