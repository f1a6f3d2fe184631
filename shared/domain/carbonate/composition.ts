/** Salinity over chlorinity, the defining ratio of Knudsen's time that the compositions below are stated in. */
const SALINITY_PER_CHLORINITY = 1.80655;

/** Total boron: Uppström 1974 (CO2SYS's default, 415.7 µmol/kg at S 35) or Lee et al. 2010 (432.6 µmol/kg). */
export type BoronRatio = 'uppstrom1974' | 'lee2010';

const BORON_AT_35: Record<BoronRatio, number> = { uppstrom1974: 415.7e-6, lee2010: 432.6e-6 };

/** What seawater holds in constant proportion to its salinity, mol/kg. */
export interface SeawaterComposition {
  boron: number;
  fluoride: number;
  sulphate: number;
  calcium: number;
}

/**
 * Conservative constituents of seawater, mol/kg.
 *
 * @param salinity practical salinity
 * @see Uppström 1974, Deep-Sea Res. 21:161; Lee et al. 2010, Geochim. Cosmochim. Acta 74:1801 (boron)
 * @see Riley 1965, Deep-Sea Res. 12:219 (fluoride); Morris & Riley 1966, Deep-Sea Res. 13:699 (sulphate);
 *   Riley & Tongudai 1967, Chem. Geol. 2:263 (calcium)
 */
export function seawaterComposition(salinity: number, boron: BoronRatio): SeawaterComposition {
  const chlorinity = salinity / SALINITY_PER_CHLORINITY;
  return {
    boron: (BORON_AT_35[boron] * salinity) / 35,
    fluoride: (0.000067 / 18.998) * chlorinity,
    sulphate: (0.14 / 96.062) * chlorinity,
    calcium: (0.02128 / 40.087) * chlorinity,
  };
}
