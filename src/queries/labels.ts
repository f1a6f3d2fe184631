import {
  useInfiniteQuery,
  useMutation,
  type UseMutationReturnType,
  useQuery,
  useQueryClient,
} from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type LabelSubject, type PrintLabels, type TakeLabels, labelEndpoints } from '@shared/contracts/labels.ts';
import { callApi } from '@/api/call-api.ts';
import { fetchFile } from '@/api/download.ts';

const labelKeys = {
  contents: (subject: LabelSubject) => ['labels', 'contents', subject] as const,
  supplies: ['labels', 'supplies'] as const,
  prints: ['labels', 'prints'] as const,
};

/** What the labels of a batch, of plugs, racks or tanks, or of an order's boxes say; null asks nothing. */
export function useLabelContents(subject: MaybeRefOrGetter<LabelSubject | null>) {
  return useQuery({
    queryKey: computed(() => labelKeys.contents(toValue(subject) ?? {})),
    queryFn: ({ signal }) => callApi(labelEndpoints.contents, { query: toValue(subject) ?? {}, signal }),
    enabled: () => toValue(subject) !== null,
  });
}

/** Blank labels on hand. */
export function useLabelSupplies() {
  return useQuery({
    queryKey: labelKeys.supplies,
    queryFn: ({ signal }) => callApi(labelEndpoints.supplies, { signal }),
  });
}

/** Runs of labels, the latest first. */
export function useLabelPrints() {
  return useInfiniteQuery({
    queryKey: labelKeys.prints,
    queryFn: ({ pageParam, signal }) =>
      callApi(labelEndpoints.prints, { query: { limit: 10, ...(pageParam ? { cursor: pageParam } : {}) }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

/** A run of labels and its PDF. */
export function useLabelRuns() {
  const client = useQueryClient();
  return {
    note: async (body: PrintLabels, signal: AbortSignal) => {
      const run = await callApi(labelEndpoints.print, { body, signal });
      void client.invalidateQueries({ queryKey: labelKeys.prints });
      return run;
    },
    file: (id: string, signal: AbortSignal) => fetchFile(labelEndpoints.file, { params: { id }, signal }, 'labels.pdf'),
    progress: (id: string, signal: AbortSignal) => callApi(labelEndpoints.progress, { params: { id }, signal }),
  };
}

export function useTakeLabels(): UseMutationReturnType<unknown, Error, TakeLabels, unknown> {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: TakeLabels) => callApi(labelEndpoints.take, { body }),
    onSuccess: () => client.invalidateQueries(),
  });
}
