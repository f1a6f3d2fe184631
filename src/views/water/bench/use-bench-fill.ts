import { computed, type ComputedRef, watch } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import type { SystemGlance } from '@shared/contracts/water.ts';
import type { ParameterCode } from '@shared/domain/units.ts';
import { useWaterOverview } from '@/queries/water.ts';
import type { BenchNumber } from '@/views/water/bench/bench-fields.ts';
import type { BenchNumbers } from '@/views/water/bench/bench-query.ts';
import { useBench } from '@/views/water/bench/use-bench.ts';

const FIELD_OF: Partial<Record<ParameterCode, BenchNumber>> = {
  salinity: 'salinity',
  temperature: 'temperatureC',
  alkalinity: 'alkalinityMeqL',
  calcium: 'calciumMgL',
  magnesium: 'magnesiumMgL',
  ph: 'ph',
  phosphate: 'phosphateMgL',
};

/** What is known of a system, as numbers of the bench. */
export function numbersOf({ latest, system, online, demand, carried }: SystemGlance): Partial<BenchNumbers> {
  const numbers: Partial<BenchNumbers> = { volumeL: system.netVolumeL };
  for (const { parameter, value } of latest) {
    const field = FIELD_OF[parameter];
    if (field) numbers[field] = value;
  }
  if (demand.enough) numbers.demandMeqL = demand.demand;
  if (online && online.alkalinityMeqL > 0) {
    numbers.strengthMeqL = online.alkalinityMeqL;
    numbers.limewaterL = online.usableL;
    // The top-off is limewater: its litres are what evaporates.
    if (carried.limewater !== null && carried.limewater > 0) {
      numbers.evaporationLPerDay = (carried.limewater * system.netVolumeL) / online.alkalinityMeqL;
    }
  }
  return numbers;
}

/** The systems that the bench can start from, and the one it did. */
export function useBenchFill(): {
  glances: ComputedRef<SystemGlance[]>;
  filledFrom: ComputedRef<SystemGlance | undefined>;
  fill: (systemId: string | null) => void;
} {
  const route = useRoute();
  const router = useRouter();
  const { numbers } = useBench();
  const { data } = useWaterOverview();
  const glances = computed<SystemGlance[]>(() => data.value?.items ?? []);
  const filledFrom = computed(() => glances.value.find(({ system }) => system.id === route.query.system));

  function fill(systemId: string | null) {
    const glance = glances.value.find(({ system }) => system.id === systemId);
    if (!glance) return;
    void router.replace({ query: { ...route.query, system: glance.system.id } });
    Object.assign(numbers, numbersOf(glance));
  }

  // A link with a system brings its readings, but what the link says itself goes first.
  let isFilled = false;
  watch(
    filledFrom,
    (glance) => {
      if (!glance || isFilled) return;
      isFilled = true;
      const unsaid = Object.entries(numbersOf(glance)).filter(([name]) => route.query[name] === undefined);
      Object.assign(numbers, Object.fromEntries(unsaid));
    },
    { immediate: true },
  );
  return { glances, filledFrom, fill };
}
