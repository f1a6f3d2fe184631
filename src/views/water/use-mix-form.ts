import { computed, watch } from 'vue';
import { RefillReservoir } from '@shared/contracts/reservoir-acts.ts';
import { reservoirEndpoints } from '@shared/contracts/reservoirs.ts';
import { USUAL_ACID_PERCENT, USUAL_LIME_PURITY } from '@shared/domain/limewater.ts';
import { callApi } from '@/api/call-api.ts';
import { useForm } from '@/composables/useForm.ts';
import { useSystemPlan } from '@/queries/plans.ts';
import { useReservoirs } from '@/queries/reservoirs.ts';
import { useSystems } from '@/queries/systems.ts';
import { useAct, useSystemDemand, useWaterItems } from '@/queries/water.ts';
import { useToastStore } from '@/stores/toasts.ts';
import { holdingMix } from '@/views/water/holding-mix.ts';
import { type MixInputs, previewMix } from '@/views/water/mix-preview.ts';
import { type MixAmounts, useMixProgress } from '@/views/water/use-mix-progress.ts';
import { useMixTarget } from '@/views/water/use-mix-target.ts';
import { useUndoEvent } from '@/views/water/use-undo-event.ts';

/** What the address asks for: where to mix, and amounts of a plan, whole or for each litre of water. */
export interface MixAsked {
  systemId?: string | undefined;
  reservoirId?: string | undefined;
  waterL?: number | undefined;
  limeG?: number | undefined;
  vinegarMl?: number | undefined;
  limeGPerL?: number | undefined;
  vinegarMlPerL?: number | undefined;
}

/** The form of a mix: what is likely stands in it, what comes of it is told while it is typed. */
export function useMixForm(asked: MixAsked) {
  const toasts = useToastStore();
  const act = useAct();
  const undoEvent = useUndoEvent();
  const { data: reservoirs, isLoading, error, refetch } = useReservoirs(() => asked.systemId);
  const { data: systems } = useSystems();
  const { data: items } = useWaterItems();
  const { chosenId, reservoir, choices } = useMixTarget(reservoirs, () => asked.reservoirId);
  const { data: demand } = useSystemDemand(() => reservoir.value?.systemId, 90);
  const { data: advised } = useSystemPlan(() => reservoir.value?.systemId);
  const progress = useMixProgress(chosenId);

  const form = useForm(
    RefillReservoir,
    {
      ...{ at: null, levelBeforeL: null, waterL: null, limeG: null, limeItemId: null },
      ...{ vinegarMl: null, vinegarItemId: null, temperatureC: 25, note: '' },
    },
    async (body, { idempotencyKey }) => {
      const params = { id: chosenId.value };
      const { event } = await act(callApi(reservoirEndpoints.refill, { params, body, idempotencyKey }));
      progress.forget();
      toasts.show('The mix is logged. It settles for two hours.', { undo: () => undoEvent(event) });
    },
  );

  const itemOf = (kind: 'lime' | 'vinegar', id: string | null | undefined) =>
    items.value?.find((item) => item.kind === kind && (id ? item.id === id : true));
  const lime = computed(() => itemOf('lime', form.values.limeItemId));
  const vinegar = computed(() => itemOf('vinegar', form.values.vinegarItemId));

  const base = computed(() => {
    const { waterL, temperatureC, levelBeforeL } = form.values;
    if (!reservoir.value || !waterL || waterL <= 0) return null;
    const before = { levelL: levelBeforeL ?? reservoir.value.levelL, alkalinityMeqL: reservoir.value.alkalinityMeqL };
    const purity = lime.value?.strength ?? USUAL_LIME_PURITY;
    const acidPercent = vinegar.value?.strength ?? USUAL_ACID_PERCENT;
    return { before, waterL, temperatureC: temperatureC ?? 25, purity, acidPercent };
  });
  const inputs = computed<MixInputs | null>(() => {
    const system = systems.value?.find(({ id }) => id === reservoir.value?.systemId);
    if (!base.value || !reservoir.value || !system) return null;
    const { limeG, vinegarMl } = form.values;
    const { volumeL } = reservoir.value;
    return { ...base.value, limeG: limeG ?? 0, vinegarMl: vinegarMl ?? 0, volumeL, netVolumeL: system.netVolumeL };
  });
  const outcome = computed(() => (inputs.value ? previewMix(inputs.value) : null));

  const holding = computed(() => {
    const facts = demand.value;
    const temperatureC = base.value?.temperatureC ?? 25;
    if (!base.value || facts?.systemId !== reservoir.value?.systemId || !facts) return null;
    return temperatureC < 15 || temperatureC > 30 ? null : holdingMix(facts, base.value);
  });
  // Amounts in the address come first, then the plan that the farm has taken for this system.
  const plan = computed(() => {
    const runs = advised.value?.systemId === reservoir.value?.systemId ? advised.value?.plan : null;
    return planned({ ...(runs && runs.limeGPerL > 0 ? runs : {}), ...givenOf(asked) }, base.value?.waterL ?? null);
  });
  const suggestion = computed(() => plan.value ?? holding.value);
  const isPlanned = computed(() => plan.value !== null);

  // Another vessel, another fill: what it has room for is the likely amount; a mix under way goes on as it was.
  watch(
    reservoir,
    (chosen, before) => {
      if (!chosen || chosen.id === before?.id) return;
      if (progress.progress.value) Object.assign(form.values, progress.progress.value.amounts);
      else startWith(chosen.levelL, chosen.volumeL);
    },
    { immediate: true },
  );
  // What is suggested stands in the fields until the person types something else.
  watch(suggestion, (next, before) => {
    if (!next || progress.progress.value) return;
    const untouched = (value: number | null | undefined, suggested: number | undefined) =>
      value === null || value === undefined || value === suggested;
    if (untouched(form.values.limeG, before?.limeG)) form.values.limeG = next.limeG;
    if (untouched(form.values.vinegarMl, before?.vinegarMl)) form.values.vinegarMl = next.vinegarMl;
  });

  const amounts = computed<MixAmounts>(() => {
    const { levelBeforeL, waterL, limeG, vinegarMl, temperatureC } = form.values;
    const known = (value: number | null | undefined) => value ?? null;
    return {
      ...{ levelBeforeL: known(levelBeforeL), waterL: known(waterL), limeG: known(limeG) },
      ...{ vinegarMl: known(vinegarMl), temperatureC: known(temperatureC) },
    };
  });
  watch(amounts, (now) => {
    progress.note(now);
  });

  function startWith(levelL: number, volumeL: number) {
    form.values.levelBeforeL = levelL;
    form.values.waterL = asked.waterL ?? (Math.max(0, volumeL - levelL) || null);
    form.values.limeG = suggestion.value?.limeG ?? null;
    form.values.vinegarMl = suggestion.value?.vinegarMl ?? null;
  }
  function startOver() {
    progress.forget();
    if (reservoir.value) startWith(reservoir.value.levelL, reservoir.value.volumeL);
  }

  return {
    ...{ form, chosenId, reservoir, choices, isLoading, error, refetch, items, lime, vinegar, inputs, outcome, demand },
    ...{ suggestion, holding, isPlanned, amounts, progress, startOver },
  };
}

type AskedAmounts = Pick<MixAsked, 'limeG' | 'vinegarMl' | 'limeGPerL' | 'vinegarMlPerL'>;

function givenOf({ limeG, vinegarMl, limeGPerL, vinegarMlPerL }: MixAsked): AskedAmounts {
  return limeG === undefined && limeGPerL === undefined ? {} : { limeG, vinegarMl, limeGPerL, vinegarMlPerL };
}

/** The amounts of a plan, whole or for each litre, for so much water. */
function planned(asked: AskedAmounts, waterL: number | null): { limeG: number; vinegarMl: number } | null {
  if (asked.limeG !== undefined) return { limeG: asked.limeG, vinegarMl: asked.vinegarMl ?? 0 };
  if (asked.limeGPerL === undefined || waterL === null) return null;
  const whole = (perL: number | undefined) => Math.round((perL ?? 0) * waterL);
  return { limeG: whole(asked.limeGPerL), vinegarMl: whole(asked.vinegarMlPerL) };
}
