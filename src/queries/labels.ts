import { useMutation, type UseMutationReturnType, useQuery, useQueryClient } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import { type LabelSubject, type TakeLabels, labelEndpoints } from '@shared/contracts/labels.ts';
import { callApi } from '@/api/call-api.ts';

const labelKeys = {
  contents: (subject: LabelSubject) => ['labels', 'contents', subject] as const,
  supplies: ['labels', 'supplies'] as const,
};

/** What the labels of a batch, of plugs or of racks say; null asks nothing. */
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

export function useTakeLabels(): UseMutationReturnType<unknown, Error, TakeLabels, unknown> {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: TakeLabels) => callApi(labelEndpoints.take, { body }),
    onSuccess: () => client.invalidateQueries(),
  });
}
