import { keepPreviousData, useInfiniteQuery, useQuery } from '@tanstack/vue-query';
import { type MaybeRefOrGetter, computed, toValue } from 'vue';
import type { z } from 'zod';
import { type CompleteTask, type CreateTask, type EditTask, taskEndpoints } from '@shared/contracts/tasks.ts';
import { callApi } from '@/api/call-api.ts';
import { newKey } from '@/api/new-key.ts';
import { useAct } from '@/queries/water.ts';

const OUTCOMES_AT_ONCE = 10;

const taskKeys = {
  list: (whose: 'mine' | 'all') => ['tasks', 'list', whose] as const,
  people: () => ['tasks', 'people'] as const,
  outcomes: () => ['tasks', 'outcomes'] as const,
};

export function useTasks(whose: MaybeRefOrGetter<'mine' | 'all'>) {
  return useInfiniteQuery({
    queryKey: computed(() => taskKeys.list(toValue(whose))),
    queryFn: ({ pageParam, signal }) =>
      callApi(taskEndpoints.list, {
        query: { whose: toValue(whose), limit: 100, ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
}

/** People that a task can be given to. */
export function useTaskPeople() {
  return useQuery({
    queryKey: taskKeys.people(),
    queryFn: ({ signal }) => callApi(taskEndpoints.people, { signal }),
    select: ({ items }) => items,
  });
}

/** What was done and skipped, newest first. */
export function useTaskOutcomes() {
  return useInfiniteQuery({
    queryKey: taskKeys.outcomes(),
    queryFn: ({ pageParam, signal }) =>
      callApi(taskEndpoints.outcomes, {
        query: { limit: OUTCOMES_AT_ONCE, ...(pageParam === null ? {} : { cursor: pageParam }) },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
}

/** Everything that is done with tasks. A test's reading changes all that shows water, so each act makes every page fresh. */
export function useTaskActs() {
  const act = useAct();
  const of = (id: string) => ({ params: { id } });
  return {
    create: (body: CreateTask, idempotencyKey: string) => act(callApi(taskEndpoints.create, { body, idempotencyKey })),
    edit: (id: string, ifMatch: number, body: EditTask) =>
      act(callApi(taskEndpoints.edit, { ...of(id), ifMatch, body })),
    complete: (id: string, body: z.input<typeof CompleteTask>, idempotencyKey = newKey()) =>
      act(callApi(taskEndpoints.complete, { ...of(id), body, idempotencyKey })),
    skip: (id: string, dueOn: string, reason: string, idempotencyKey: string) =>
      act(callApi(taskEndpoints.skip, { ...of(id), body: { dueOn, reason }, idempotencyKey })),
    end: (id: string) => act(callApi(taskEndpoints.end, of(id))),
    resume: (id: string) => act(callApi(taskEndpoints.resume, of(id))),
    undo: (outcomeId: string) => act(callApi(taskEndpoints.undo, of(outcomeId))),
  };
}
