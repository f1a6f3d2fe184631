/** Middle time of many runs, ms. The first tenth warms up and does not count. */
export async function medianOf(runs: number, act: (run: number) => unknown): Promise<number> {
  const times: number[] = [];
  const warmUp = Math.ceil(runs / 10);
  for (let run = 0; run < runs + warmUp; run += 1) {
    const start = performance.now();
    await act(run);
    if (run >= warmUp) times.push(performance.now() - start);
  }
  times.sort((a, b) => a - b);
  return times[Math.floor(times.length / 2)] ?? Number.NaN;
}
