import type { CarbonateConstants } from './constants.ts';

/** Total: what the constants are on. Free and seawater (sws): other scales of papers. NBS: what a probe reads. */
export const PH_SCALES = ['total', 'free', 'sws', 'nbs'] as const;
export type PhScale = (typeof PH_SCALES)[number];

/** Hydrogen ion of a scale for one on the total scale. */
function perTotal(constants: CarbonateConstants, scale: PhScale): number {
  switch (scale) {
    case 'total':
      return 1;
    case 'free':
      return constants.freePerTotal;
    case 'sws':
      return constants.swsPerTotal;
    case 'nbs':
      return constants.nbsPerTotal;
  }
}

/** pH on a scale from pH on the total scale. */
export function phOnScale(constants: CarbonateConstants, phTotal: number, scale: PhScale): number {
  return phTotal - Math.log10(perTotal(constants, scale));
}

/** pH on the total scale from pH on another. */
export function phTotalFrom(constants: CarbonateConstants, ph: number, scale: PhScale): number {
  return ph + Math.log10(perTotal(constants, scale));
}
