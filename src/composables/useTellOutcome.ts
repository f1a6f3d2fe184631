import { toApiError } from '@/api/api-error.ts';
import { useToastStore } from '@/stores/toasts.ts';

/** Does something and says at the edge of the screen how it went; for acts that have no form around them. */
export function useTellOutcome(): (done: string, act: () => Promise<unknown>) => Promise<boolean> {
  const toasts = useToastStore();
  return async (done, act) => {
    try {
      await act();
      toasts.show(done);
      return true;
    } catch (error) {
      toasts.show(toApiError(error).detail, { tone: 'brick' });
      return false;
    }
  };
}
