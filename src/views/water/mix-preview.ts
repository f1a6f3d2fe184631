import { type LimewaterResult, mixLimewater } from '@shared/domain/limewater.ts';
import { strengthAfterRefill } from '@shared/domain/reservoir-state.ts';
import { DomainError } from '@shared/errors.ts';

export interface MixInputs {
  /** What stood in the reservoir before, L and meq/L. */
  before: { levelL: number; alkalinityMeqL: number };
  volumeL: number;
  waterL: number;
  limeG: number;
  purity: number;
  vinegarMl: number;
  acidPercent: number;
  temperatureC: number;
  netVolumeL: number;
}

export interface MixPreview {
  mix: LimewaterResult;
  levelL: number;
  /** Strength of the whole after the mix joined the rest, meq/L. */
  alkalinityMeqL: number;
  /** What all of it would add to the system, meq/L. */
  wholeDoseMeqL: number;
}

/** What a planned mix would make, or why it can't be made. */
export function previewMix(
  inputs: MixInputs,
): { preview: MixPreview; problem: null } | { preview: null; problem: string } {
  const { before, volumeL, waterL, netVolumeL } = inputs;
  const levelL = before.levelL + waterL;
  if (levelL > volumeL) return { preview: null, problem: 'That is more than the reservoir holds. Use less water.' };
  try {
    const mix = mixLimewater(inputs);
    const alkalinityMeqL = strengthAfterRefill(before, { waterL, alkalinityMeqL: mix.alkalinityMeqL });
    const wholeDoseMeqL = (levelL * alkalinityMeqL) / netVolumeL;
    return { preview: { mix, levelL, alkalinityMeqL, wholeDoseMeqL }, problem: null };
  } catch (error) {
    if (error instanceof DomainError) return { preview: null, problem: error.message };
    throw error;
  }
}
