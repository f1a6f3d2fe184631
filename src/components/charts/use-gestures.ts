import { type ComputedRef, type Ref, computed, ref } from 'vue';
import { type Span, pinchSpan, zoomSpan } from '@/components/charts/zoom.ts';

/** A drag shorter than this, px, is a press. */
const LEAST_DRAG = 8;
const WHEEL_STEP = 1.2;

interface Chart {
  frame: Readonly<Ref<HTMLElement | null>>;
  /** Where the drawing starts and ends across, px. */
  range: ComputedRef<Span>;
  bounds: ComputedRef<Span>;
  /** The part that is shown. */
  span: ComputedRef<Span>;
  instantAt: (px: number) => number;
  /** Shows another part; null for the whole. */
  show: (span: Span | null) => void;
  pointAt: (instant: number) => void;
  leave: () => void;
}

interface Gestures {
  /** The stretch that is being marked, px; null while nothing is. */
  marked: ComputedRef<Span | null>;
  down: (event: PointerEvent) => void;
  move: (event: PointerEvent) => void;
  up: (event: PointerEvent) => void;
  cancel: (event: PointerEvent) => void;
  out: (event: PointerEvent) => void;
  wheel: (event: WheelEvent) => void;
}

/** A mouse marks a stretch to look closer; one finger reads out; two fingers pull the days apart or along. */
export function useGestures(chart: Chart): Gestures {
  const drag = ref<{ from: number; to: number } | null>(null);
  const fingers = new Map<number, { px: number; held: number }>();

  const marked = computed<Span | null>(() => {
    if (!drag.value || Math.abs(drag.value.to - drag.value.from) < LEAST_DRAG) return null;
    return [Math.min(drag.value.from, drag.value.to), Math.max(drag.value.from, drag.value.to)];
  });

  function down(event: PointerEvent) {
    const px = pxOf(event);
    if (event.pointerType === 'touch') {
      fingers.set(event.pointerId, { px, held: chart.instantAt(px) });
      chart.pointAt(chart.instantAt(px));
    } else if (event.button === 0) drag.value = { from: inside(px), to: inside(px) };
  }

  function move(event: PointerEvent) {
    const px = pxOf(event);
    const finger = fingers.get(event.pointerId);
    if (finger) finger.px = px;
    if (fingers.size === 2) pinch();
    else if (drag.value) drag.value.to = inside(px);
    if (fingers.size < 2) chart.pointAt(chart.instantAt(px));
  }

  function up(event: PointerEvent) {
    if (marked.value) chart.show([chart.instantAt(marked.value[0]), chart.instantAt(marked.value[1])]);
    cancel(event);
  }
  function cancel(event: PointerEvent) {
    drag.value = null;
    fingers.delete(event.pointerId);
  }
  /** What a finger read stays to be looked at; the mouse takes it along. */
  function out(event: PointerEvent) {
    if (event.pointerType !== 'touch') chart.leave();
    cancel(event);
  }
  /** Plain turning scrolls the page; a pinch on a touch pad comes as a turn with Ctrl. */
  function wheel(event: WheelEvent) {
    if (!event.ctrlKey) return;
    event.preventDefault();
    const factor = event.deltaY > 0 ? WHEEL_STEP : 1 / WHEEL_STEP;
    chart.show(zoomSpan(chart.span.value, chart.bounds.value, factor, chart.instantAt(pxOf(event))));
  }

  function pinch() {
    const [a, b] = [...fingers.values()];
    if (!a || !b) return;
    chart.show(pinchSpan([a.held, b.held], [a.px, b.px], chart.range.value, chart.bounds.value));
  }
  function pxOf(event: MouseEvent): number {
    return event.clientX - (chart.frame.value?.getBoundingClientRect().left ?? 0);
  }
  function inside(px: number): number {
    return Math.min(Math.max(px, chart.range.value[0]), chart.range.value[1]);
  }
  return { marked, down, move, up, cancel, out, wheel };
}
