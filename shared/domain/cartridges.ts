import { assertAboveZero } from './ranges.ts';

/** The stages of a make-up water unit, in the order that water runs through them. */
export const CARTRIDGE_STAGES = ['sediment', 'carbon', 'membrane', 'resin'] as const;
export type CartridgeStage = (typeof CARTRIDGE_STAGES)[number];

/** From this part of its life on a cartridge is due soon. */
const SOON = 0.9;

/**
 * Where lives start for a new farm (common practice, no source; the maker's figures count): sediment and carbon half a
 * year, a membrane two years or until it holds back less than 90 %, resin until 1 mg/L comes through.
 */
export const CARTRIDGE_DEFAULTS: Record<CartridgeStage, { lifeDays: number | null; limit: number | null }> = {
  sediment: { lifeDays: 180, limit: null },
  carbon: { lifeDays: 180, limit: null },
  membrane: { lifeDays: 730, limit: 90 },
  resin: { lifeDays: null, limit: 1 },
};

export interface CartridgeLife {
  stage: CartridgeStage;
  lifeDays: number | null;
  lifeL: number | null;
  /** Membrane: the least rejection, %. Resin: the most TDS that may leave it, mg/L. Others have none. */
  limit: number | null;
  daysUsed: number;
  litresUsed: number;
  /** The last figure that the limit is for; null where none was logged since it was installed. */
  measured: number | null;
}

export interface CartridgeState {
  state: 'ok' | 'soon' | 'due';
  /** What ends it first. */
  by: 'days' | 'litres' | 'limit' | null;
  /** Part of its life that is over by the one that ends it first, 0 and up; 0 where no life is set. */
  usedPart: number;
}

/** Part of the salts that a membrane holds back, %; null where nothing came in. */
export function rejectionPercent(tdsIn: number, tdsAfterMembrane: number): number | null {
  return tdsIn > 0 ? (1 - tdsAfterMembrane / tdsIn) * 100 : null;
}

/**
 * Whether a cartridge is to be replaced: by days, by litres, or by what comes through it, whichever is first.
 *
 * @throws {DomainError} `domain.out_of_range` for a life that is not above zero
 */
export function cartridgeState(life: CartridgeLife): CartridgeState {
  if (isBeyondLimit(life)) return { state: 'due', by: 'limit', usedPart: 1 };
  const parts: { by: 'days' | 'litres'; usedPart: number }[] = [];
  if (life.lifeDays !== null) {
    assertAboveZero('Life (days)', life.lifeDays);
    parts.push({ by: 'days', usedPart: life.daysUsed / life.lifeDays });
  }
  if (life.lifeL !== null) {
    assertAboveZero('Life (L)', life.lifeL);
    parts.push({ by: 'litres', usedPart: life.litresUsed / life.lifeL });
  }
  const first = parts.sort((a, b) => b.usedPart - a.usedPart)[0];
  if (!first) return { state: 'ok', by: null, usedPart: 0 };
  const state = first.usedPart >= 1 ? 'due' : first.usedPart >= SOON ? 'soon' : 'ok';
  return { state, ...first };
}

function isBeyondLimit({ stage, limit, measured }: CartridgeLife): boolean {
  if (limit === null || measured === null) return false;
  if (stage === 'membrane') return measured < limit;
  return stage === 'resin' && measured > limit;
}
