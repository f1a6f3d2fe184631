/** How long a plug was followed, in days, and whether it was lost then; not lost: sold, given away or still alive. */
export interface FollowedPlug {
  day: number;
  lost: boolean;
  /** How many plugs of the same fate stand behind it; 1 when left out. */
  count?: number;
}

/** From `day` on the curve stands at `survival`; `low` and `high` bound it with 95 % confidence. */
export interface SurvivalStep {
  day: number;
  atRisk: number;
  lost: number;
  survival: number;
  /** Greenwood's standard error; null once all are lost, where it has no value. */
  standardError: number | null;
  low: number;
  high: number;
}

/** Two-sided 95 % quantile of the normal distribution. */
const Z95 = 1.959963984540054;

/**
 * The survivors' curve of plugs, by the product-limit estimate. A plug that left alive on a day still counts as at risk
 * on that day. The band is Greenwood's variance on the log-log scale, which stays within 0 and 1.
 *
 * @returns one step for each day with a loss, in order; empty where none was lost
 * @see Kaplan & Meier 1958, Journal of the American Statistical Association 53:457–481
 * @see Greenwood 1926, Reports on Public Health and Medical Subjects 33 (the standard error)
 * @see Kalbfleisch & Prentice 2002, The Statistical Analysis of Failure Time Data, section 1.4 (log-log band)
 */
export function survivalCurve(plugs: readonly FollowedPlug[]): SurvivalStep[] {
  let survival = 1;
  let greenwood = 0;
  return lossDays(plugs).map(({ day, atRisk, lost }) => {
    survival *= 1 - lost / atRisk;
    greenwood += lost / (atRisk * (atRisk - lost));
    const standardError = survival > 0 ? survival * Math.sqrt(greenwood) : null;
    return { day, atRisk, lost, survival, standardError, ...band(survival, greenwood) };
  });
}

/** Days with a loss, each with the plugs that were still followed when it began. */
function lossDays(plugs: readonly FollowedPlug[]): { day: number; atRisk: number; lost: number }[] {
  let atRisk = plugs.reduce((sum, { count = 1 }) => sum + count, 0);
  const days: { day: number; atRisk: number; lost: number }[] = [];
  let left = 0;
  for (const { day, lost, count = 1 } of [...plugs].sort((a, b) => a.day - b.day)) {
    let today = days.at(-1);
    if (today?.day !== day) {
      atRisk -= left;
      left = 0;
      today = { day, atRisk, lost: 0 };
      days.push(today);
    }
    left += count;
    if (lost) today.lost += count;
  }
  return days.filter(({ lost }) => lost > 0);
}

/** Where all are lost the log-log scale has no value: the band is then the whole range that it can be. */
function band(survival: number, greenwood: number): { low: number; high: number } {
  if (survival <= 0) return { low: 0, high: 0 };
  const spread = (Z95 * Math.sqrt(greenwood)) / Math.log(survival);
  const bounds = [survival ** Math.exp(spread), survival ** Math.exp(-spread)] as const;
  return { low: Math.min(...bounds), high: Math.max(...bounds) };
}
