import type { Lane, Panel } from '@/components/charts/series.ts';

const TOP = 34;
const FIRST_HEIGHT = 190;
const HEIGHT = 96;
const PANEL_GAP = 32;
const LANE_HEIGHT = 32;
const AFTER_LANES = 14;

interface Stack {
  panels: { panel: Panel; height: number; top: number }[];
  lanes: { lane: Lane; top: number }[];
  /** Where the time axis lies. */
  height: number;
}

/** Where everything lies, from the top: the main panel, the acts that may explain it, the other panels. */
export function stackOf(panels: readonly Panel[], lanes: readonly Lane[]): Stack {
  const stack: Stack = { panels: [], lanes: [], height: TOP };
  let top = TOP;
  const putLanes = () => {
    for (const lane of lanes) {
      stack.lanes.push({ lane, top });
      top += LANE_HEIGHT;
    }
    if (lanes.length > 0) top += AFTER_LANES;
  };
  panels.forEach((panel, index) => {
    const height = panel.height ?? (index === 0 ? FIRST_HEIGHT : HEIGHT);
    stack.panels.push({ panel, height, top });
    stack.height = top + height;
    top += height + PANEL_GAP;
    if (index === 0) putLanes();
  });
  if (panels.length === 0) putLanes();
  if (panels.length < 2 && lanes.length > 0) stack.height = top - PANEL_GAP / 2;
  return stack;
}
