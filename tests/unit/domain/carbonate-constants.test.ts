import { describe, expect, it } from 'vitest';
import { seawaterComposition } from '../../../shared/domain/carbonate/composition.ts';
import { carbonateConstants } from '../../../shared/domain/carbonate/constants.ts';
import { phosphoricAcidSws, waterSws } from '../../../shared/domain/carbonate/dissociation.ts';
import { co2FugacityFactor, co2Solubility, nbsActivity } from '../../../shared/domain/carbonate/solubility.ts';
import reference from '../../reference/carbonate-constants.json' with { type: 'json' };

const within = (value: number, expected: number) => expect(Math.abs(value / expected - 1)).toBeLessThan(1e-6);

// PyCO2SYS 1.8.3; at S 35 and 25 °C also as printed in Dickson, Sabine & Christian 2007, chapter 5.
describe.each(reference.constants)('constants at S $salinity and $temp_C °C', (row) => {
  const kelvin = row.temp_C + 273.15;
  const constants = carbonateConstants(row.salinity, row.temp_C, 'uppstrom1974');

  it('carbonic, boric and the other acids', () => {
    within(Math.log10(constants.k1), row.log10_K1_total);
    within(Math.log10(constants.k2), row.log10_K2_total);
    within(Math.log(constants.boric), row.ln_KB_total);
    within(Math.log(constants.bisulphateFree), row.ln_KS_free);
    within(Math.log(constants.fluorideFree), row.ln_KF_DR79_free);
  });

  it('water, on the seawater and on the total scale', () => {
    within(Math.log(waterSws(row.salinity, kelvin)), row.ln_KW_sws);
    within(Math.log(constants.water), row.ln_KW_total_via_SWS_DR79);
  });

  it('carbon dioxide, minerals and the probe', () => {
    within(Math.log(co2Solubility(row.salinity, kelvin)), row.ln_K0);
    within(co2FugacityFactor(kelvin), row.fugacity_factor);
    within(Math.log10(constants.aragonite), row.log10_Ksp_aragonite);
    within(Math.log10(constants.calcite), row.log10_Ksp_calcite);
    within(nbsActivity(row.salinity, kelvin), row.fH);
  });

  it('what seawater is made of', () => {
    within(seawaterComposition(row.salinity, 'uppstrom1974').boron * 1e6, row.TB_U74_umolkg);
    within(seawaterComposition(row.salinity, 'lee2010').boron * 1e6, row.TB_L10_umolkg);
    within(constants.total.sulphate * 1e6, row.TS_umolkg);
    within(constants.total.fluoride * 1e6, row.TF_umolkg);
    within(constants.total.calcium * 1e6, row.Ca_umolkg);
  });
});

// Dickson, Sabine & Christian 2007, chapter 5, on the total scale at S 35 and 25 °C: −3.71, −13.727, −20.24 (from memory).
it('phosphoric acid is near the printed values of the guide', () => {
  const { p1, p2, p3 } = phosphoricAcidSws(35, 298.15);
  expect(Math.log(p1)).toBeCloseTo(-3.71, 1);
  expect(Math.log(p2)).toBeCloseTo(-13.727, 1);
  expect(Math.log(p3)).toBeCloseTo(-20.24, 1);
});
