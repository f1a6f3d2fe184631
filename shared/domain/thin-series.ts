/** One point of a chart. */
export interface SeriesPoint {
  at: number;
  value: number;
}

/**
 * Fewer points with the same look: the time is cut into equal parts and each keeps its lowest and its highest point, so
 * that no spike is lost. Points that are few enough come back as they are.
 *
 * @param points in order of time
 * @param most how many may come back; 2 or more
 */
export function thinSeries<Point extends SeriesPoint>(points: readonly Point[], most: number): Point[] {
  const first = points[0];
  const last = points.at(-1);
  if (points.length <= most || !first || !last) return [...points];
  const parts = Math.floor(most / 2);
  const width = (last.at - first.at) / parts || 1;
  const extremes = new Map<number, { low: Point; high: Point }>();
  for (const point of points) {
    const part = Math.min(parts - 1, Math.floor((point.at - first.at) / width));
    const known = extremes.get(part);
    if (!known) extremes.set(part, { low: point, high: point });
    else if (point.value < known.low.value) known.low = point;
    else if (point.value > known.high.value) known.high = point;
  }
  return [...extremes.values()].flatMap(({ low, high }) => {
    if (low === high) return [low];
    return low.at <= high.at ? [low, high] : [high, low];
  });
}
