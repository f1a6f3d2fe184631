import { computed } from 'vue';
import type { Form } from '@/composables/useForm.ts';

interface StaleEditOptions<Values> {
  /** Words for the fields that both versions are shown for. */
  labels: Partial<Record<keyof Values, string>>;
  /** Goes on from the other's version: with one's own values, or with theirs. */
  adopt: (current: Values & { version: number }) => void;
}

/** When someone else saved first: both versions for AppConflict, and what happens on each choice. */
export function useStaleEdit<Values extends object>(form: Form<Values>, options: StaleEditOptions<Values>) {
  const current = computed(() =>
    form.failure?.code === 'edit.stale'
      ? // The server sends the record in the shape of its contract.
        (form.failure.details.current as Values & { version: number })
      : null,
  );
  const rows = computed(() => {
    const theirs = current.value;
    if (theirs === null) return [];
    const labels = Object.entries(options.labels) as [keyof Values, string][];
    return labels.map(([key, label]) => ({ label, mine: shown(form.values[key]), theirs: shown(theirs[key]) }));
  });

  async function keepMine(): Promise<boolean> {
    if (current.value === null) return false;
    options.adopt(current.value);
    return form.submit();
  }

  function takeTheirs(): void {
    const theirs = current.value;
    if (theirs === null) return;
    options.adopt(theirs);
    const keys = Object.keys(options.labels) as (keyof Values)[];
    form.reset({ ...form.values, ...Object.fromEntries(keys.map((key) => [key, theirs[key]])) });
  }

  return { current, rows, keepMine, takeTheirs };
}

function shown(value: unknown): string {
  return value === null || value === undefined || value === '' ? '—' : String(value);
}
