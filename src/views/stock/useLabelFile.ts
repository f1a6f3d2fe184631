import { onScopeDispose, reactive } from 'vue';
import type { LabelPrint } from '@shared/contracts/labels.ts';
import { toApiError, type ApiError } from '@/api/api-error.ts';
import { saveBlob } from '@/api/download.ts';
import { useLabelRuns } from '@/queries/labels.ts';

const ASK_EVERY_MS = 400;

type FileState = 'none' | 'making' | 'ready';

/** Makes the PDF of a run of labels: tells how far it is, can be stopped, and keeps the file until the next. */
export function useLabelFile() {
  const runs = useLabelRuns();
  const file = reactive({
    state: 'none' as FileState,
    done: 0,
    labels: 0,
    name: '',
    address: '',
    failure: null as ApiError | null,
  });
  let blob: Blob | null = null;
  let stopper: AbortController | null = null;

  /** @param begin the run: a new one, or one of before */
  async function make(begin: (signal: AbortSignal) => Promise<LabelPrint> | LabelPrint): Promise<void> {
    clear();
    const mine = (stopper = new AbortController());
    const { signal } = mine;
    file.state = 'making';
    let asking: ReturnType<typeof setInterval> | undefined;
    try {
      const run = await begin(signal);
      file.labels = run.labels;
      asking = setInterval(() => void ask(run.id, signal), ASK_EVERY_MS);
      const made = await runs.file(run.id, signal);
      if (signal.aborted) return;
      blob = made.blob;
      Object.assign(file, { state: 'ready', name: made.name, address: URL.createObjectURL(made.blob) });
    } catch (error) {
      if (signal.aborted) return;
      Object.assign(file, { state: 'none', failure: toApiError(error) });
    } finally {
      clearInterval(asking);
    }
  }

  async function ask(id: string, signal: AbortSignal): Promise<void> {
    // Progress is a courtesy: where it cannot be told, the file comes all the same.
    const progress = await runs.progress(id, signal).catch(() => null);
    if (progress && !signal.aborted) file.done = Math.max(file.done, progress.done);
  }

  /** Stops what is being made and lets go of what was. */
  function clear(): void {
    stopper?.abort();
    if (file.address !== '') URL.revokeObjectURL(file.address);
    blob = null;
    Object.assign(file, { state: 'none', done: 0, labels: 0, name: '', address: '', failure: null });
  }

  function save(): void {
    if (blob) saveBlob(blob, file.name);
  }

  onScopeDispose(clear);
  return { file, make, clear, save };
}
