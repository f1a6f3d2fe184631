import { assertAboveZero, assertNotNegative } from './ranges.ts';

/** How far the intake usually stands above the bottom, mm: 1 to 1.5 in, so that no sludge is drawn (common practice). */
export const USUAL_INTAKE_MM = { least: 25, most: 38 } as const;

/** What is known of a vessel's shape. Walls are taken as upright. */
export interface Vessel {
  /** What it holds when full, L. */
  volumeL: number;
  /** Inner height up to the full level, mm. */
  heightMm: number | null;
  /** Inner area of the bottom, cm². */
  footprintCm2: number | null;
  /** Height of the intake above the bottom, mm. */
  intakeMm: number | null;
}

/**
 * Litres that stand in a vessel at a depth of water: area × depth where the area is known, else the full volume by part
 * of the height. Never more than it holds.
 *
 * @param depthMm depth of the water from the bottom, mm, zero or more
 * @returns L; null where neither area nor height is known
 * @throws {DomainError} `domain.out_of_range`
 */
export function litresAtDepth(vessel: Vessel, depthMm: number): number | null {
  assertNotNegative('Depth (mm)', depthMm);
  const perMm = litresPerMm(vessel);
  return perMm === null ? null : Math.min(vessel.volumeL, perMm * depthMm);
}

/**
 * Litres below the intake, which are never drawn.
 *
 * @returns L; 0 where the intake's height or the vessel's shape is not known
 */
export function litresBelowIntake(vessel: Vessel): number {
  return vessel.intakeMm === null ? 0 : (litresAtDepth(vessel, vessel.intakeMm) ?? 0);
}

/**
 * Litres that may still be drawn: what stands above the intake.
 *
 * @param levelL what stands in the vessel, L
 */
export function usableLitres(vessel: Vessel, levelL: number): number {
  return Math.max(0, levelL - litresBelowIntake(vessel));
}

function litresPerMm({ volumeL, heightMm, footprintCm2 }: Vessel): number | null {
  assertAboveZero('Volume (L)', volumeL);
  // 1 cm² of 1 mm is 0.1 cm³.
  if (footprintCm2 !== null) return footprintCm2 / 10_000;
  return heightMm === null ? null : volumeL / heightMm;
}
