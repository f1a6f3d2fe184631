import { type Ref, ref } from 'vue';
import { toApiError } from '@/api/api-error.ts';
import type { ScanEntry } from '@/views/scan/scan-entries.ts';

const MOST_ENTRIES = 200;

/** What an act that went through adds to its entry. */
export type Outcome = Pick<ScanEntry, 'detail'> & Partial<Pick<ScanEntry, 'to' | 'undo'>>;

/** The running list of scans. Acts run one after the other, so that positions fill in the order of the scans. */
export function useScanEntries(onOutcome: (went: boolean) => void): {
  entries: Ref<ScanEntry[]>;
  refuse: (title: string, detail: string, suggestion?: string) => void;
  run: (title: string, sameAs: string | null, act: () => Promise<Outcome>) => Promise<void>;
  undo: (entry: ScanEntry) => Promise<void>;
  alreadyDone: (sameAs: string) => boolean;
} {
  const entries = ref<ScanEntry[]>([]);
  let lastId = 0;
  let queue: Promise<void> = Promise.resolve();

  function add(entry: Omit<ScanEntry, 'id' | 'retry'>): number {
    lastId += 1;
    entries.value = [{ id: lastId, retry: null, ...entry }, ...entries.value].slice(0, MOST_ENTRIES);
    return lastId;
  }

  function change(id: number, fields: Partial<ScanEntry>): void {
    entries.value = entries.value.map((entry) => (entry.id === id ? { ...entry, ...fields } : entry));
  }

  function refuse(title: string, detail: string, suggestion?: string): void {
    add({ title, detail, state: 'refused', sameAs: null, ...(suggestion === undefined ? {} : { suggestion }) });
    onOutcome(false);
  }

  function run(title: string, sameAs: string | null, act: () => Promise<Outcome>): Promise<void> {
    const id = add({ title, detail: 'Sending …', state: 'working', sameAs });
    return send(id, act);
  }

  function send(id: number, act: () => Promise<Outcome>): Promise<void> {
    const turn = queue.then(() => attempt(id, act));
    queue = turn;
    return turn;
  }

  async function attempt(id: number, act: () => Promise<Outcome>): Promise<void> {
    try {
      change(id, { state: 'done', ...(await act()) });
      onOutcome(true);
    } catch (thrown) {
      const error = toApiError(thrown);
      const retry = async () => {
        change(id, { state: 'working', detail: 'Sending …', retry: null });
        await send(id, act);
      };
      change(id, { state: 'refused', detail: error.detail, retry: error.isUnreachable ? retry : null });
      onOutcome(false);
    }
  }

  async function undo(entry: ScanEntry): Promise<void> {
    if (!entry.undo) return;
    change(entry.id, { state: 'working' });
    try {
      await entry.undo();
      change(entry.id, { state: 'undone', detail: `Undone: ${entry.detail}` });
    } catch (thrown) {
      change(entry.id, { state: 'done', detail: `${entry.detail}. ${toApiError(thrown).detail}` });
      onOutcome(false);
    }
  }

  function alreadyDone(sameAs: string): boolean {
    return entries.value.some((entry) => entry.sameAs === sameAs && ['working', 'done'].includes(entry.state));
  }

  return { entries, refuse, run, undo, alreadyDone };
}
