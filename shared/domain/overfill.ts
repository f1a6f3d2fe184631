import { DomainError } from '../errors.ts';
import { doseEffect, type DoseEffect, limewaterDose, type WaterState } from './dose-effect.ts';
import { assertAboveZero, assertNotNegative } from './ranges.ts';

/** A system, and the limewater that could run into it. */
export interface OverfillRisk {
  water: WaterState;
  systemVolumeL: number;
  /** Strength of the limewater, counted in the end, meq/L. */
  strengthMeqL: number;
  /** Part of the strength that is acetate, meq/L; none when left out. */
  acetateMeqL?: number;
  roomPco2Uatm?: number;
}

/** How far the water may go. */
export interface OverfillLimits {
  /** pH (NBS) just after mixing. */
  ph: number;
  /** Aragonite saturation just after mixing. */
  omegaAragonite: number;
  /** Change of alkalinity in the end, up or down, meq/L. */
  changeMeqL: number;
}

/** `beyond`: the water would leave what the equations of seawater hold for. */
export type OverfillLimit = 'ph' | 'omega' | 'change' | 'beyond';

export interface Overfill {
  litres: number;
  /** Null where it is beyond what can be reckoned: a grave overdose. */
  effect: DoseEffect | null;
  /** The limits that it breaks. */
  broken: OverfillLimit[];
}

/** The scan from below finds the first limit even where a later one would ease off again with dilution. */
const SCAN_STEPS = 24;
const HALVINGS = 24;

/**
 * What limewater does that runs into a system all at once, over and above what evaporated: everything rises with the
 * lime, and salinity falls with its water.
 *
 * @param litres what runs in, L
 * @throws {DomainError} `domain.out_of_range` where the water as it is can't be true
 */
export function overfill(risk: OverfillRisk, litres: number, limits: OverfillLimits): Overfill {
  assertRisk(risk);
  assertNotNegative('Limewater (L)', litres);
  return overfillFrom(risk, litres, limits);
}

/**
 * The most that may run in at once without breaking a limit: how much to keep in the reservoir at most.
 *
 * @param atMostL where to stop looking, such as what the reservoir holds, L
 * @returns litres, and the limit that stands in the way of more; null where even `atMostL` breaks none
 * @throws {DomainError} `domain.out_of_range` where the water as it is can't be true
 */
export function largestOverfill(
  risk: OverfillRisk,
  atMostL: number,
  limits: OverfillLimits,
): { litres: number; stoppedBy: OverfillLimit | null } {
  assertRisk(risk);
  assertAboveZero('Litres at most', atMostL);
  const brokenAt = (litres: number) => overfillFrom(risk, litres, limits).broken[0] ?? null;
  const already = brokenAt(0);
  if (already !== null) return { litres: 0, stoppedBy: already };
  const steps = Array.from({ length: SCAN_STEPS }, (_, index) => (atMostL * (index + 1)) / SCAN_STEPS);
  const first = steps.findIndex((litres) => brokenAt(litres) !== null);
  if (first < 0) return { litres: atMostL, stoppedBy: null };
  let [fine, tooMuch] = [steps[first - 1] ?? 0, steps[first] ?? atMostL];
  for (let halving = 0; halving < HALVINGS; halving += 1) {
    const middle = (fine + tooMuch) / 2;
    if (brokenAt(middle) === null) fine = middle;
    else tooMuch = middle;
  }
  return { litres: fine, stoppedBy: brokenAt(tooMuch) };
}

/**
 * What has run in when a top-off control sticks: all that may be drawn, or what the pump moves in the time until somebody
 * sees it.
 *
 * @param drawableL litres above the intake
 * @param run the pump and its hours; left out, nothing stops it before the reservoir is empty
 */
export function litresRunIn(drawableL: number, run?: { litresPerHour: number; hours: number }): number {
  assertNotNegative('Litres that may be drawn', drawableL);
  if (!run) return drawableL;
  assertNotNegative('Pump (L/h)', run.litresPerHour);
  assertNotNegative('Hours', run.hours);
  return Math.min(drawableL, run.litresPerHour * run.hours);
}

function overfillFrom(risk: OverfillRisk, litres: number, limits: OverfillLimits): Overfill {
  const effect = effectOf(risk, litres);
  return { litres, effect, broken: effect === null ? ['beyond'] : brokenBy(effect, limits) };
}

function effectOf({ water, systemVolumeL, strengthMeqL, ...risk }: OverfillRisk, litres: number): DoseEffect | null {
  const acetate = risk.acetateMeqL === undefined ? {} : { acetateMeqL: risk.acetateMeqL };
  try {
    return doseEffect(water, limewaterDose(litres, strengthMeqL, systemVolumeL, acetate), risk.roomPco2Uatm);
  } catch (error) {
    // The water itself was solved already, so only the dose can have driven it out of range.
    if (error instanceof DomainError && error.code === 'domain.out_of_range') return null;
    throw error;
  }
}

function brokenBy({ before, atOnce, equilibrated }: DoseEffect, limits: OverfillLimits): OverfillLimit[] {
  return [
    ...(atOnce.phNbs > limits.ph ? (['ph'] as const) : []),
    ...(atOnce.omegaAragonite > limits.omegaAragonite ? (['omega'] as const) : []),
    ...(Math.abs(equilibrated.alkalinityMeqL - before.alkalinityMeqL) > limits.changeMeqL ? (['change'] as const) : []),
  ];
}

function assertRisk({ water, systemVolumeL, strengthMeqL, roomPco2Uatm }: OverfillRisk): void {
  assertAboveZero('System volume (L)', systemVolumeL);
  assertNotNegative('Strength (meq/L)', strengthMeqL);
  doseEffect(water, { alkalinityMeqL: 0, calciumMgL: 0 }, roomPco2Uatm);
}
