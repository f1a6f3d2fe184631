import { type Ref, type ShallowRef, onScopeDispose, ref, shallowRef } from 'vue';
import type { BarcodeReader } from '@/scanning/barcode-reader.ts';
import { makeRepeatFilter } from '@/scanning/repeat-filter.ts';

/** What the camera does, or why it can't. */
export type CameraState = 'off' | 'starting' | 'on' | 'insecure' | 'missing' | 'refused' | 'busy' | 'failed';

export interface BarcodeScanner {
  /** Bind to the video element that shows the picture. */
  video: ShallowRef<HTMLVideoElement | null>;
  state: Ref<CameraState>;
  hasLamp: Ref<boolean>;
  lampIsOn: Ref<boolean>;
  start: () => Promise<void>;
  stop: () => void;
  switchLamp: () => Promise<void>;
}

const PAUSE_MS = 90;
const AWAY_MS = 1500;

/** The camera as a scanner: every label that comes into view is told once. */
export function useBarcodeScanner({ onCode }: { onCode: (text: string) => void }): BarcodeScanner {
  const video = shallowRef<HTMLVideoElement | null>(null);
  const state = ref<CameraState>('off');
  const hasLamp = ref(false);
  const lampIsOn = ref(false);
  let stream: MediaStream | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let run = 0;

  async function start(): Promise<void> {
    if (state.value === 'starting' || state.value === 'on') return;
    // Browsers give cameras to pages behind HTTPS or on the machine itself only; elsewhere `mediaDevices` is missing.
    if (!window.isSecureContext) {
      state.value = 'insecure';
      return;
    }
    state.value = 'starting';
    const thisRun = ++run;
    try {
      const [reader, opened] = await Promise.all([loadReader(), openCamera()]);
      if (thisRun !== run || !video.value) {
        closeStream(opened);
        return;
      }
      stream = opened;
      video.value.srcObject = opened;
      await video.value.play();
      state.value = 'on';
      hasLamp.value = lampOf(opened) !== null;
      watchVideo(reader, thisRun);
    } catch (error) {
      if (thisRun !== run) return;
      stop();
      state.value = stateOf(error);
    }
  }

  function watchVideo(reader: BarcodeReader, thisRun: number): void {
    const isNew = makeRepeatFilter(AWAY_MS);
    const look = async () => {
      const picture = video.value;
      if (thisRun !== run || !picture) return;
      if (picture.readyState >= HTMLMediaElement.HAVE_CURRENT_DATA && !document.hidden) {
        // A frame that could not be read is followed by the next one.
        const texts = await reader.read(picture).catch(() => []);
        if (thisRun !== run) return;
        for (const text of texts) if (isNew(text, performance.now())) onCode(text);
      }
      timer = setTimeout(() => void look(), PAUSE_MS);
    };
    void look();
  }

  function stop(): void {
    run += 1;
    clearTimeout(timer);
    if (stream) closeStream(stream);
    stream = null;
    if (video.value) video.value.srcObject = null;
    hasLamp.value = false;
    lampIsOn.value = false;
    state.value = 'off';
  }

  async function switchLamp(): Promise<void> {
    const track = stream && lampOf(stream);
    if (!track) return;
    const wanted = !lampIsOn.value;
    // `torch` is in the Image Capture draft, but not in TypeScript's list of constraints.
    await track.applyConstraints({ advanced: [{ torch: wanted } as MediaTrackConstraintSet] });
    lampIsOn.value = wanted;
  }

  onScopeDispose(stop);
  return { video, state, hasLamp, lampIsOn, start, stop, switchLamp };
}

/** Fetched when a camera starts: nobody who types needs its engine. */
async function loadReader(): Promise<BarcodeReader> {
  const { makeBarcodeReader } = await import('@/scanning/barcode-reader.ts');
  return makeBarcodeReader();
}

function openCamera(): Promise<MediaStream> {
  return navigator.mediaDevices.getUserMedia({
    audio: false,
    video: { facingMode: { ideal: 'environment' }, width: { ideal: 1280 }, height: { ideal: 720 } },
  });
}

function closeStream(stream: MediaStream): void {
  for (const track of stream.getTracks()) track.stop();
}

function lampOf(stream: MediaStream): MediaStreamTrack | null {
  const [track] = stream.getVideoTracks();
  return track && 'torch' in track.getCapabilities() ? track : null;
}

/** The names that getUserMedia's errors have (W3C Media Capture and Streams, §10.6). */
function stateOf(error: unknown): CameraState {
  const name = error instanceof DOMException ? error.name : '';
  if (name === 'NotAllowedError' || name === 'SecurityError') return 'refused';
  if (name === 'NotFoundError' || name === 'OverconstrainedError') return 'missing';
  return name === 'NotReadableError' || name === 'AbortError' ? 'busy' : 'failed';
}
