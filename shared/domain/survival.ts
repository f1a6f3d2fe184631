/** How long one plug was followed, in days, and whether it was lost then; not lost: sold, given away or still alive. */
export interface FollowedPlug {
  day: number;
  lost: boolean;
}

/** From `day` on the curve stands at `survival`; `low` and `high` bound it with 95 % confidence. */
export interface SurvivalStep {
  day: number;
  atRisk: number;
  lost: number;
  survival: number;
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
 * @see Kalbfleisch & Prentice 2002, The Statistical Analysis of Failure Time Data, section 1.4 (log-log band)
 */
export function survivalCurve(plugs: readonly FollowedPlug[]): SurvivalStep[] {
  const lostDays = [...new Set(plugs.filter(({ lost }) => lost).map(({ day }) => day))].sort((a, b) => a - b);
  let survival = 1;
  let greenwood = 0;
  return lostDays.map((day) => {
    const atRisk = plugs.filter((plug) => plug.day >= day).length;
    const lost = plugs.filter((plug) => plug.lost && plug.day === day).length;
    survival *= 1 - lost / atRisk;
    greenwood += lost / (atRisk * (atRisk - lost));
    return { day, atRisk, lost, survival, ...band(survival, greenwood) };
  });
}

/** Where all are lost the log-log scale has no value: the band is then the whole range that it can be. */
function band(survival: number, greenwood: number): { low: number; high: number } {
  if (survival <= 0) return { low: 0, high: 0 };
  const spread = (Z95 * Math.sqrt(greenwood)) / Math.log(survival);
  const bounds = [survival ** Math.exp(spread), survival ** Math.exp(-spread)] as const;
  return { low: Math.min(...bounds), high: Math.max(...bounds) };
}
