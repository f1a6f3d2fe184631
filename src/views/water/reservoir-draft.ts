import type { z } from 'zod';
import type { CreateReservoir } from '@shared/contracts/reservoir-set-up.ts';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { SLUDGE_WEEKS } from '@shared/domain/reservoir-care.ts';
import type { Draft } from '@/composables/useForm.ts';

export type ReservoirDraft = Draft<z.input<typeof CreateReservoir>>;

export function newReservoirDraft(systemId: string): ReservoirDraft {
  return {
    ...{ code: '', systemId, volumeL: null, heightMm: null, footprintCm2: null, intakeMm: null, covered: true },
    ...{ pumpLPerH: null, replaceDays: null, sludgeWeeks: SLUDGE_WEEKS.usual },
  };
}

export function draftOfReservoir(reservoir: Reservoir): ReservoirDraft {
  const { code, systemId, volumeL, heightMm, footprintCm2, intakeMm, covered, pumpLPerH } = reservoir;
  const { replaceDays, sludgeWeeks } = reservoir;
  return {
    ...{ code, systemId, volumeL, heightMm, footprintCm2, intakeMm, covered },
    ...{ pumpLPerH, replaceDays, sludgeWeeks },
  };
}
