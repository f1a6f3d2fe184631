import { useLocalStorage } from '@vueuse/core';
import { onScopeDispose } from 'vue';

export type ScanSignal = 'done' | 'again' | 'refused';

/** Pitches in Hz and pattern of the buzz in ms: high and short is good, low and long needs a look. */
const SIGNALS: Record<ScanSignal, { pitches: readonly number[]; lengthS: number; buzz: number[] }> = {
  done: { pitches: [1320], lengthS: 0.09, buzz: [40] },
  again: { pitches: [880, 880], lengthS: 0.07, buzz: [30, 60, 30] },
  refused: { pitches: [220, 165], lengthS: 0.16, buzz: [200, 80, 200] },
};
const LOUDNESS = 0.18;

/** A sound and a buzz at each scan, so that eyes can stay on the rack. */
export function useScanSignal() {
  const soundIsOn = useLocalStorage('limestead.scan-sound', true);
  let context: AudioContext | null = null;

  function signal(kind: ScanSignal): void {
    const { pitches, lengthS, buzz } = SIGNALS[kind];
    if ('vibrate' in navigator) navigator.vibrate(buzz);
    if (!soundIsOn.value || !('AudioContext' in window)) return;
    context ??= new AudioContext();
    void context.resume();
    for (const [index, pitch] of pitches.entries()) beep(context, pitch, index * lengthS * 1.3, lengthS);
  }

  onScopeDispose(() => void context?.close());
  return { soundIsOn, signal };
}

function beep(context: AudioContext, pitch: number, afterS: number, lengthS: number): void {
  const start = context.currentTime + afterS;
  const loudness = context.createGain();
  loudness.gain.setValueAtTime(LOUDNESS, start);
  // Faded out: a tone that is cut off clicks.
  loudness.gain.exponentialRampToValueAtTime(0.001, start + lengthS);
  const tone = context.createOscillator();
  tone.frequency.value = pitch;
  tone.connect(loudness).connect(context.destination);
  tone.start(start);
  tone.stop(start + lengthS);
}
