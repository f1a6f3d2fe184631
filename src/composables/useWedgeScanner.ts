import { onScopeDispose } from 'vue';
import { makeBurstReader } from '@/scanning/burst-reader.ts';

type Field = HTMLInputElement | HTMLTextAreaElement;

/**
 * Hears a scanner that types like a keyboard, wherever the focus is. What it typed into a field by the way is taken out
 * again, so that a code never ends up as a size or a note.
 */
export function useWedgeScanner({ onCode }: { onCode: (text: string) => void }): void {
  const readKey = makeBurstReader({ maxGapMs: 60, minLength: 3 });
  let before: { field: Field; value: string } | null = null;

  function hear(event: KeyboardEvent): void {
    if (event.ctrlKey || event.altKey || event.metaKey || event.repeat) return;
    const field = fieldOf(event.target);
    const step = readKey(event.key, event.timeStamp);
    if (step.kind === 'started') before = field && { field, value: field.value };
    if (step.kind !== 'scanned') return;

    event.preventDefault();
    event.stopPropagation();
    if (before && before.field === field) putBack(before.field, before.value);
    before = null;
    onCode(step.text);
  }

  // Captured before any field or button acts on the keys.
  document.addEventListener('keydown', hear, { capture: true });
  onScopeDispose(() => {
    document.removeEventListener('keydown', hear, { capture: true });
  });
}

function fieldOf(target: EventTarget | null): Field | null {
  return target instanceof HTMLInputElement || target instanceof HTMLTextAreaElement ? target : null;
}

function putBack(field: Field, value: string): void {
  field.value = value;
  field.dispatchEvent(new Event('input', { bubbles: true }));
}
