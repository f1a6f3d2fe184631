import { useLocalStorage } from '@vueuse/core';
import { type Ref, computed } from 'vue';
import type { MixingStep } from '@shared/domain/mixing-steps.ts';

/** Amounts of a mix that is under way. */
export interface MixAmounts {
  levelBeforeL: number | null;
  waterL: number | null;
  limeG: number | null;
  vinegarMl: number | null;
  temperatureC: number | null;
}

export interface MixProgress {
  startedAt: number;
  done: MixingStep['code'][];
  amounts: MixAmounts;
}

/** A mix that nobody went on with for so long is forgotten. */
const KEPT_MS = 12 * 3_600_000;

/** Which steps of a mix are done, kept on this device so that a reload in the middle of the work loses nothing. */
export function useMixProgress(reservoirId: Ref<string>) {
  const kept = useLocalStorage<Record<string, MixProgress>>('limestead.mixing', {});
  const progress = computed(() => {
    const found = kept.value[reservoirId.value];
    return found && Date.now() - found.startedAt < KEPT_MS ? found : undefined;
  });

  function tick(code: MixingStep['code'], isDone: boolean, amounts: MixAmounts): void {
    const before = progress.value ?? { startedAt: Date.now(), done: [], amounts };
    const done = isDone ? [...before.done, code] : before.done.filter((each) => each !== code);
    keep({ ...before, done, amounts });
  }

  /** The amounts were changed while the work goes on. */
  function note(amounts: MixAmounts): void {
    if (progress.value) keep({ ...progress.value, amounts });
  }

  function forget(): void {
    const { [reservoirId.value]: _, ...others } = kept.value;
    kept.value = others;
  }

  function keep(next: MixProgress): void {
    kept.value = { ...kept.value, [reservoirId.value]: next };
  }

  return { progress, tick, note, forget };
}
