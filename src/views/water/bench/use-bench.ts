import { useDebounceFn } from '@vueuse/core';
import { inject, type InjectionKey, provide, reactive, watch } from 'vue';
import { useRoute, useRouter } from 'vue-router';
import type { BenchChoices } from '@/views/water/bench/bench-fields.ts';
import {
  benchToQuery,
  choicesFromQuery,
  numbersFromQuery,
  type BenchNumbers,
} from '@/views/water/bench/bench-query.ts';

const WRITE_AFTER_MS = 300;

/** What lies on the bench: numbers in canonical units (null where a field was emptied), and choices. */
export interface Bench {
  numbers: BenchNumbers;
  choices: BenchChoices;
}

const BENCH: InjectionKey<Bench> = Symbol('bench');

/** Sets the bench up for the calculators below. The address holds all of it, so that a link brings it back. */
export function provideBench(): Bench {
  const route = useRoute();
  const router = useRouter();
  const numbers = reactive(numbersFromQuery(route.query));
  const choices = reactive(choicesFromQuery(route.query));
  let written = '';

  const write = useDebounceFn(() => {
    const { system, ...shown } = route.query;
    const query = benchToQuery(numbers, choices);
    // A page that was left in the meantime keeps its own address.
    if (route.name !== 'bench' || JSON.stringify(query) === JSON.stringify(shown)) return;
    written = JSON.stringify(query);
    void router.replace({ query: system === undefined ? query : { system, ...query } });
  }, WRITE_AFTER_MS);
  watch([numbers, choices], write, { deep: true });

  // Back, forward and links change the address from outside; what was written here must not overtake the typing.
  watch(
    () => route.query,
    ({ system, ...query }) => {
      const isOwn = JSON.stringify(query) === written;
      written = '';
      if (isOwn || route.name !== 'bench') return;
      const [said, chosen] = [numbersFromQuery(query), choicesFromQuery(query)];
      if (JSON.stringify(benchToQuery(said, chosen)) === JSON.stringify(benchToQuery(numbers, choices))) return;
      Object.assign(numbers, said);
      Object.assign(choices, chosen);
    },
  );

  const bench = { numbers, choices };
  provide(BENCH, bench);
  return bench;
}

/** The bench that a page above has set up. */
export function useBench(): Bench {
  const bench = inject(BENCH);
  if (!bench) throw new Error('A calculator stands on the bench page only.');
  return bench;
}
