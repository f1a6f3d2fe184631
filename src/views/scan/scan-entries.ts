import type { RouteLocationRaw } from 'vue-router';
import type { Tone } from '@/components/tone.ts';

export type ScanAct = 'look' | 'move' | 'loss' | 'measure';

/** One scan in the running list, newest first. */
export interface ScanEntry {
  id: number;
  /** The code as people read it, or the text that was no code. */
  title: string;
  detail: string;
  state: 'working' | 'done' | 'refused' | 'undone';
  /** Scans of the same act on the same plug toward the same end have the same key: the second one changes nothing. */
  sameAs: string | null;
  to?: RouteLocationRaw;
  undo?: () => Promise<unknown>;
  /** Set where no answer came: sends the same act again, which counts once. */
  retry: (() => Promise<void>) | null;
  /** The code that was probably meant. */
  suggestion?: string;
}

export const ENTRY_TONES: Record<ScanEntry['state'], Tone> = {
  working: 'slate',
  done: 'kelp',
  refused: 'brick',
  undone: 'plain',
};
