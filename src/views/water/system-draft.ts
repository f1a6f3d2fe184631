import type { z } from 'zod';
import { type CreateSystem, SYSTEM_KIND_LABELS, type System } from '@shared/contracts/systems.ts';
import { PARAMETERS } from '@shared/domain/units.ts';
import type { ConflictRow } from '@/components/AppConflict.vue';
import type { Draft } from '@/composables/useForm.ts';
import type { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { bandText } from '@/views/water/band-text.ts';
import { parameterOf } from '@/views/water/water-labels.ts';

export type SystemDraft = Draft<z.input<typeof CreateSystem>>;

/** A new system starts with the usual bands of what is tested most. */
const USUAL_BANDS = ['alkalinity', 'calcium', 'magnesium', 'salinity', 'temperature'] as const;

export function newSystemDraft(): SystemDraft {
  const bands = PARAMETERS.filter(({ code }) => USUAL_BANDS.some((usual) => usual === code)).map(({ code, band }) => ({
    ...{ parameter: code, low: band.min, high: band.max },
  }));
  return { code: '', name: '', kind: 'growout', netVolumeL: null, surfaceM2: null, note: '', bands };
}

export function draftOfSystem({ code, name, kind, netVolumeL, surfaceM2, note, bands }: System): SystemDraft {
  return { code, name, kind, netVolumeL, surfaceM2, note, bands: bands.map((band) => ({ ...band })) };
}

/** Both versions of a system, side by side. */
export function conflictRows(
  mine: SystemDraft,
  theirs: SystemDraft,
  units: ReturnType<typeof useUnitChoicesStore>,
): ConflictRow[] {
  const bands = (draft: SystemDraft) =>
    (draft.bands ?? [])
      .flatMap(({ parameter, low, high }) =>
        parameter && low !== null && high !== null
          ? [`${parameterOf(parameter).label} ${bandText({ parameter, low, high }, units)}`]
          : [],
      )
      .join('; ');
  const kind = (draft: SystemDraft) => (draft.kind ? SYSTEM_KIND_LABELS[draft.kind] : '');
  const volume = (draft: SystemDraft) => units.say('volume', draft.netVolumeL);
  const surface = ({ surfaceM2 }: SystemDraft) => (surfaceM2 ? `${formatNumber(surfaceM2, { decimals: 2 })} m²` : '');
  return [
    { label: 'Code', mine: mine.code ?? '', theirs: theirs.code ?? '' },
    { label: 'Name', mine: mine.name ?? '', theirs: theirs.name ?? '' },
    { label: 'Used for', mine: kind(mine), theirs: kind(theirs) },
    { label: 'Net water volume', mine: volume(mine), theirs: volume(theirs) },
    { label: 'Open water surface', mine: surface(mine), theirs: surface(theirs) },
    { label: 'Note', mine: mine.note ?? '', theirs: theirs.note ?? '' },
    { label: 'Target bands', mine: bands(mine), theirs: bands(theirs) },
  ];
}
