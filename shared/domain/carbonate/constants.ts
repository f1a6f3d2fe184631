import { seawaterComposition, type BoronRatio, type SeawaterComposition } from './composition.ts';
import {
  bisulphateFree,
  boricAcid,
  carbonicAcid,
  hydrogenFluorideFree,
  phosphoricAcidSws,
  waterSws,
} from './dissociation.ts';
import { carbonateMinerals, co2FugacityFactor, co2Solubility, nbsActivity } from './solubility.ts';

const KELVIN_AT_0_C = 273.15;

/** Everything that salinity and temperature settle. Acids on the total scale, but bisulphate and fluoride on the free. */
export interface CarbonateConstants {
  total: SeawaterComposition;
  k1: number;
  k2: number;
  boric: number;
  water: number;
  bisulphateFree: number;
  fluorideFree: number;
  phosphoric: { p1: number; p2: number; p3: number };
  /** Dissolved carbon dioxide under one atmosphere of partial pressure, mol/kg. */
  co2PerAtm: number;
  aragonite: number;
  calcite: number;
  /** Hydrogen ion on the free, seawater and NBS scale for one on the total scale. */
  freePerTotal: number;
  swsPerTotal: number;
  nbsPerTotal: number;
}

/**
 * Equilibrium constants of seawater at one atmosphere.
 *
 * @param salinity practical salinity, 19–43
 * @param temperatureC °C, 2–35
 */
export function carbonateConstants(salinity: number, temperatureC: number, boron: BoronRatio): CarbonateConstants {
  const kelvin = temperatureC + KELVIN_AT_0_C;
  const total = seawaterComposition(salinity, boron);
  const bisulphate = bisulphateFree(salinity, kelvin);
  const fluoride = hydrogenFluorideFree(salinity, kelvin);
  const boundBySulphate = 1 + total.sulphate / bisulphate;
  const freePerTotal = 1 / boundBySulphate;
  const swsPerTotal = (boundBySulphate + total.fluoride / fluoride) / boundBySulphate;
  const { p1, p2, p3 } = phosphoricAcidSws(salinity, kelvin);
  return {
    total,
    ...carbonicAcid(salinity, kelvin),
    boric: boricAcid(salinity, kelvin),
    water: waterSws(salinity, kelvin) / swsPerTotal,
    bisulphateFree: bisulphate,
    fluorideFree: fluoride,
    phosphoric: { p1: p1 / swsPerTotal, p2: p2 / swsPerTotal, p3: p3 / swsPerTotal },
    co2PerAtm: co2Solubility(salinity, kelvin) * co2FugacityFactor(kelvin),
    ...carbonateMinerals(salinity, kelvin),
    freePerTotal,
    swsPerTotal,
    nbsPerTotal: swsPerTotal * nbsActivity(salinity, kelvin),
  };
}
