import { type MaybeRefOrGetter, type Ref, computed, ref, toValue, watch } from 'vue';
import type { Reservoir } from '@shared/contracts/reservoirs.ts';
import { systemTitle } from '@shared/domain/system-title.ts';

/** Which reservoir is mixed in: the one asked for, else the emptiest that is not online. */
export function useMixTarget(
  reservoirs: Ref<readonly Reservoir[] | undefined>,
  asked: MaybeRefOrGetter<string | undefined>,
) {
  const chosenId = ref(toValue(asked) ?? '');
  const reservoir = computed(() => reservoirs.value?.find(({ id }) => id === chosenId.value));
  const choices = computed(() =>
    (reservoirs.value ?? []).map(({ id, code, systemCode, systemName, state }) => ({
      value: id,
      title: `${code} of ${systemTitle({ code: systemCode, name: systemName })}, ${state}`,
    })),
  );
  watch(
    reservoirs,
    (known) => {
      if (!known || reservoir.value) return;
      const byRoom = [...known].sort((a, b) => a.levelL / a.volumeL - b.levelL / b.volumeL);
      chosenId.value = (byRoom.find(({ state }) => state !== 'online') ?? byRoom[0])?.id ?? '';
    },
    { immediate: true },
  );
  return { chosenId, reservoir, choices };
}
