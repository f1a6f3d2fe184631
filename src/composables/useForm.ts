import { reactive, ref, watch } from 'vue';
import type { z } from 'zod';
import { type ApiError, toApiError } from '@/api/api-error.ts';
import { newKey } from '@/api/new-key.ts';
import { type FieldMessages, parseDraft, valueAt } from '@/composables/parse-draft.ts';

/** What stands in a form: the same shape as what is sent, with null where a field is still empty. */
export type Draft<T> = T extends readonly (infer Item)[]
  ? Draft<Item>[]
  : T extends object
    ? { [Key in keyof T]: Draft<T[Key]> }
    : T | null;

export interface Form<Values> {
  values: Values;
  /** Messages by dotted path, from the contract and from the server alike. */
  readonly errors: Readonly<FieldMessages>;
  /** Why the server refused the whole; null when only fields are to blame. */
  readonly failure: ApiError | null;
  readonly submitting: boolean;
  /** Counts refused attempts, so that AppForm can move focus at each. */
  readonly refusals: number;
  /** Name and message for a field: `v-bind="form.field('email')"`. */
  field: (path: string) => FieldBinding;
  /** True when it went through. A second call while one is under way does nothing. */
  submit: () => Promise<boolean>;
  /** Back to the initial values, or to others. */
  reset: (values?: Values) => void;
}

/** Attributes of one field; `data-field` is where AppForm looks for the first one to mend. */
export interface FieldBinding {
  name: string;
  errorMessages: string[];
  'data-field': string;
}

export interface SubmitContext {
  /** The same for every try of one submit whose outcome is not known; pass it on to `callApi`. */
  idempotencyKey: string;
}

/** A form checked by the contract that the server checks too. */
export function useForm<Schema extends z.ZodType>(
  schema: Schema,
  initial: Draft<z.input<Schema>>,
  send: (data: z.output<Schema>, context: SubmitContext) => Promise<unknown>,
): Form<Draft<z.input<Schema>>> {
  type Values = Draft<z.input<Schema>>;
  const values = ref(copyOf(initial)) as { value: Values };
  const errors = ref<FieldMessages>({});
  const failure = ref<ApiError | null>(null);
  const submitting = ref(false);
  const refusals = ref(0);
  let idempotencyKey: string | null = null;
  let refusedValues: Values = copyOf(initial);

  // A message goes as soon as its field has another value than the one that was refused.
  watch(
    () => values.value,
    () => {
      errors.value = Object.fromEntries(Object.entries(errors.value).filter(([path]) => !hasChanged(path)));
    },
    { deep: true },
  );

  function hasChanged(path: string): boolean {
    const keys = path.split('.');
    return JSON.stringify(valueAt(values.value, keys)) !== JSON.stringify(valueAt(refusedValues, keys));
  }

  async function submit(): Promise<boolean> {
    if (submitting.value) return false;
    failure.value = null;
    const parsed = parseDraft(schema, values.value);
    if (!parsed.ok) {
      refuse(parsed.errors);
      return false;
    }
    submitting.value = true;
    idempotencyKey ??= newKey();
    try {
      await send(parsed.data, { idempotencyKey });
      idempotencyKey = null;
      errors.value = {};
      return true;
    } catch (thrown) {
      takeFailure(toApiError(thrown));
      return false;
    } finally {
      submitting.value = false;
    }
  }

  function takeFailure(error: ApiError): void {
    // Without an answer the server may have done it: the next try must be recognised as the same.
    if (!error.isUnreachable) idempotencyKey = null;
    failure.value = error.fields.length > 0 ? null : error;
    refuse(Object.fromEntries(error.fields.map(({ path, message }) => [path, message])));
  }

  function refuse(messages: FieldMessages): void {
    refusedValues = copyOf(values.value);
    errors.value = messages;
    refusals.value += 1;
  }

  function field(path: string): FieldBinding {
    const message = errors.value[path];
    return { name: path, 'data-field': path, errorMessages: message === undefined ? [] : [message] };
  }

  function reset(next?: Values): void {
    values.value = copyOf(next ?? initial);
    errors.value = {};
    failure.value = null;
    idempotencyKey = null;
  }

  const form = reactive({ values, errors, failure, submitting, refusals, field, submit, reset });
  // `reactive` unwraps the refs; TypeScript can't follow that through the generic draft.
  return form as unknown as Form<Values>;
}

/** Drafts hold plain values only, so a trip through JSON copies all of them, proxies included. */
function copyOf<T>(values: T): T {
  return JSON.parse(JSON.stringify(values)) as T;
}
