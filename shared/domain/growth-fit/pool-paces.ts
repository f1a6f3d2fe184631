/** Growth of one batch of a line as a multiple of what is usual for the line; 1: as usual. */
export interface ObservedPace {
  line: string;
  genus: string;
  ratio: number;
}

/** How much faster than usual something grows, as far as is known. */
interface Pace {
  ratio: number;
  sd: number;
}

export interface PooledPaces {
  /** The pace of a line, also of one that was never measured: then that of its genus, or of the farm. */
  of: (line: string, genus: string) => Pace & { batches: number };
}

/** What is believed before anything was measured, from memory: usual paces hold within a third. */
const BEFORE: Pace = { ratio: 1, sd: 0.35 };
/** Least differences of batches, lines and genera that are taken for true, so that few agreeing data stay modest (from memory). */
const LEAST_SD = { batch: 0.1, line: 0.1, genus: 0.1 };

interface Group extends Pace {
  key: string;
  parent: string;
}

/**
 * The pace of each line drawn toward that of its genus, and of each genus toward the farm's, the more the fewer of its
 * batches were measured (normal means with variances told from the data themselves).
 *
 * @see Efron & Morris 1975, Journal of the American Statistical Association 70:311–319
 * @see DerSimonian & Laird 1986, Controlled Clinical Trials 7:177–188 (the variance between groups)
 */
export function poolPaces(observed: readonly ObservedPace[]): PooledPaces {
  const lines = lineMeans(observed);
  const amongLines = spreadAmong(lines, LEAST_SD.line);
  const genera = meansOf(lines, amongLines);
  const amongGenera = spreadAmong(genera, LEAST_SD.genus);
  const [ofAll] = meansOf(
    genera.map((each) => ({ ...each, parent: 'farm' })),
    amongGenera,
  );
  const farm = towards(ofAll, BEFORE);
  const genusPace = (genus: string) =>
    towards(
      genera.find(({ key }) => key === genus),
      widened(farm, amongGenera),
    );
  return {
    of: (line, genus) => ({
      ...towards(
        lines.find(({ key }) => key === line),
        widened(genusPace(genus), amongLines),
      ),
      batches: observed.filter((each) => each.line === line).length,
    }),
  };
}

function lineMeans(observed: readonly ObservedPace[]): Group[] {
  const keys = [...new Set(observed.map(({ line }) => line))];
  const groups = keys.map((key) => ({ key, of: observed.filter(({ line }) => line === key) }));
  const squares = groups.reduce((sum, { of }) => sum + squaresAround(of.map(({ ratio }) => ratio)), 0);
  const free = observed.length - groups.length;
  const within = Math.max(LEAST_SD.batch, free > 0 ? Math.sqrt(squares / free) : BEFORE.sd);
  return groups.map(({ key, of }) => ({
    key,
    parent: of[0]?.genus ?? '',
    ratio: mean(of.map(({ ratio }) => ratio)),
    sd: within / Math.sqrt(of.length),
  }));
}

/** The mean of each parent's groups, weighted by how well each is known. */
function meansOf(groups: readonly Group[], among: number): Group[] {
  return [...new Set(groups.map(({ parent }) => parent))].map((key) => {
    const own = groups.filter(({ parent }) => parent === key).map((each) => widened(each, among));
    return { key, parent: 'farm', ...own.reduce(combined) };
  });
}

function spreadAmong(groups: readonly Group[], least: number): number {
  const weights = groups.map(({ sd }) => 1 / sd ** 2);
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const middle = groups.reduce((sum, { ratio }, index) => sum + ratio * (weights[index] ?? 0), 0) / total;
  const heterogeneity = groups.reduce(
    (sum, { ratio }, index) => sum + (weights[index] ?? 0) * (ratio - middle) ** 2,
    0,
  );
  const scale = total - weights.reduce((sum, weight) => sum + weight ** 2, 0) / total;
  return scale > 0 ? Math.max(least, Math.sqrt(Math.max(0, heterogeneity - groups.length + 1) / scale)) : least;
}

function towards(own: Pace | undefined, parent: Pace): Pace {
  return own ? combined(own, parent) : { ratio: parent.ratio, sd: parent.sd };
}

function combined(a: Pace, b: Pace): Pace {
  const [weightA, weightB] = [1 / a.sd ** 2, 1 / b.sd ** 2];
  return {
    ratio: (a.ratio * weightA + b.ratio * weightB) / (weightA + weightB),
    sd: 1 / Math.sqrt(weightA + weightB),
  };
}

function widened({ ratio, sd }: Pace, by: number): Pace {
  return { ratio, sd: Math.hypot(sd, by) };
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

function squaresAround(values: readonly number[]): number {
  const middle = mean(values);
  return values.reduce((sum, value) => sum + (value - middle) ** 2, 0);
}
