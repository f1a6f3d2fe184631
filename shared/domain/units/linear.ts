/** How one unit of a quantity relates to the canonical unit that is stored. */
export interface Unit {
  toCanonical: (value: number) => number;
  fromCanonical: (value: number) => number;
  label: string;
  /** Decimals that a reading in this unit is usually shown with. */
  decimals: number;
}

/** A unit that is a multiple of the canonical one. */
export function multiple(label: string, canonicalPerUnit: number, decimals: number): Unit {
  return {
    label,
    decimals,
    toCanonical: (value) => value * canonicalPerUnit,
    fromCanonical: (value) => value / canonicalPerUnit,
  };
}
