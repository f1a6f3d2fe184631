import { type Ref, ref, watch } from 'vue';
import type { LogSheet } from '@shared/contracts/readings.ts';
import type { TestMethod } from '@shared/contracts/test-methods.ts';
import { PARAMETER_CODES, type ParameterCode } from '@shared/domain/units.ts';
import { useUnitChoicesStore } from '@/stores/unit-choices.ts';
import type { LogDraft } from '@/views/water/log-draft.ts';

/**
 * The drafts of the log page, one for each parameter. Unit, method and kit lot start as this person had them last; what
 * was typed stays when another system is chosen.
 */
export function useLogDrafts(sheet: Ref<LogSheet | undefined>, methods: Ref<readonly TestMethod[]>) {
  const units = useUnitChoicesStore();
  const drafts = ref<LogDraft[]>(
    PARAMETER_CODES.map((parameter) => ({
      ...{ parameter, text: '', unit: units.unitFor(parameter), methodId: null, kitLotId: null, confirmed: false },
    })),
  );

  watch(
    [sheet, methods],
    ([rows, known]) => {
      for (const draft of drafts.value) {
        const row = rows?.parameters.find(({ parameter }) => parameter === draft.parameter);
        if (!row || draft.text !== '') continue;
        const own = known.filter(({ parameter, retired }) => parameter === draft.parameter && !retired);
        const method = own.find(({ id }) => id === row.methodId) ?? (own.length === 1 ? own[0] : undefined);
        const lot = method?.lots.find(({ id, usedUp }) => id === row.kitLotId && !usedUp);
        draft.methodId = method?.id ?? null;
        draft.kitLotId = lot?.id ?? null;
        draft.unit = row.unit || method?.unit || units.unitFor(draft.parameter);
      }
    },
    { immediate: true },
  );

  /** Puts a value into the field that it belongs to, and takes it out of the one it was typed in. */
  function move(from: ParameterCode, to: { parameter: ParameterCode; value: number; unit: string }): void {
    for (const draft of drafts.value) {
      if (draft.parameter === from) draft.text = '';
      if (draft.parameter === to.parameter) Object.assign(draft, { text: String(to.value), unit: to.unit });
    }
  }

  return { drafts, move };
}
