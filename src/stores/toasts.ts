import { defineStore } from 'pinia';
import { ref } from 'vue';

export type ToastTone = 'kelp' | 'ochre' | 'brick' | 'slate';

export interface Toast {
  id: number;
  message: string;
  tone: ToastTone;
  undo?: () => Promise<unknown> | unknown;
}

const STAY_MS = 5_000;
/** Long enough to notice a slip, look down, and reach for Undo with gloves on. */
const STAY_WITH_UNDO_MS = 10_000;
const MOST_AT_ONCE = 3;

/** Short messages at the edge of the screen about what has just been done. */
export const useToastStore = defineStore('toasts', () => {
  const toasts = ref<Toast[]>([]);
  let lastId = 0;

  function show(message: string, options: { tone?: ToastTone; undo?: Toast['undo'] } = {}): number {
    const { tone = 'kelp', undo } = options;
    const id = ++lastId;
    toasts.value = [...toasts.value, { id, message, tone, ...(undo ? { undo } : {}) }].slice(-MOST_AT_ONCE);
    setTimeout(
      () => {
        dismiss(id);
      },
      undo ? STAY_WITH_UNDO_MS : STAY_MS,
    );
    return id;
  }

  function dismiss(id: number): void {
    toasts.value = toasts.value.filter((toast) => toast.id !== id);
  }

  return { toasts, show, dismiss };
});
