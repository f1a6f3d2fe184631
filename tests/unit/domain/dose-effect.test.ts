import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { carbonateConstants } from '../../../shared/domain/carbonate/constants.ts';
import { phOnScale } from '../../../shared/domain/carbonate/ph-scales.ts';
import { doseEffect, limewaterDose, type Chem, type WaterState } from '../../../shared/domain/dose-effect.ts';
import { seawaterDensity } from '../../../shared/domain/seawater.ts';
import reference from '../../reference/limewater-dose.json' with { type: 'json' };
import { domainErrorOf } from '../../support/domain-error.ts';

const water: WaterState = { salinity: 35, temperatureC: 25, alkalinityMeqL: 2.85, calciumMgL: 420, phNbs: 8.2 };

const waters = fc.record({
  salinity: fc.double({ min: 28, max: 38, noNaN: true }),
  temperatureC: fc.double({ min: 20, max: 30, noNaN: true }),
  alkalinityMeqL: fc.double({ min: 2, max: 4.5, noNaN: true }),
  calciumMgL: fc.double({ min: 350, max: 500, noNaN: true }),
  phNbs: fc.double({ min: 7.7, max: 8.6, noNaN: true }),
});

/** Litres into which one litre of the system has grown, from its salt, which neither came nor went. */
function volumeAfter(before: Chem, after: Chem, temperatureC: number): number {
  const massBefore = seawaterDensity(before.salinity, temperatureC);
  return (massBefore * before.salinity) / after.salinity / seawaterDensity(after.salinity, temperatureC);
}

describe('limewater into seawater', () => {
  // PyCO2SYS 1.8.3: alkalinity + 2c and calcium + c at constant DIC; then the same alkalinity in balance with the room.
  it.each(reference.doses)('$id µmol/kg: at once and in balance with the room', (row) => {
    const { salinity, temperatureC, limeUmolKg, roomPco2Uatm } = row;
    const densityKgL = seawaterDensity(salinity, temperatureC) / 1000;
    const doseMmolL = (limeUmolKg * densityKgL) / 1000;
    const constants = carbonateConstants(salinity, temperatureC, 'uppstrom1974');
    const { before, atOnce, equilibrated } = doseEffect(
      {
        ...{ salinity, temperatureC, calciumMgL: row.calciumMgL },
        alkalinityMeqL: (row.alkalinityUmolKg * densityKgL) / 1000,
        phNbs: phOnScale(constants, row.phTotal, 'nbs'),
      },
      { alkalinityMeqL: 2 * doseMmolL, calciumMgL: doseMmolL * 40.078 },
      roomPco2Uatm,
    );

    expect(before.phTotal).toBeCloseTo(row.phTotal, 10);
    expect(Math.abs(atOnce.phTotal - row.after.phTotal)).toBeLessThan(1e-7);
    expect(Math.abs(equilibrated.phTotal - row.equilibrated.phTotal)).toBeLessThan(1e-7);
    expect((atOnce.alkalinityMeqL / densityKgL) * 1000).toBeCloseTo(row.after.alkalinityUmolKg, 6);
    expect(atOnce.calciumMgL).toBeCloseTo(row.after.calciumMgL, 5);
    expect(atOnce.pco2Uatm / row.after.pco2Uatm).toBeCloseTo(1, 6);
    expect(atOnce.omegaAragonite / row.after.omegaAragonite).toBeCloseTo(1, 6);
    expect(equilibrated.omegaAragonite / row.equilibrated.omegaAragonite).toBeCloseTo(1, 6);
    expect(equilibrated.pco2Uatm / roomPco2Uatm).toBeCloseTo(1, 9);
  });
});

describe('mass balance', () => {
  it('what is dosed is what arrives, diluted by its own water', () => {
    fc.assert(
      fc.property(
        waters,
        fc.double({ min: 0, max: 60, noNaN: true }),
        fc.double({ min: 0, max: 45, noNaN: true }),
        (state, litres, strength) => {
          const dose = limewaterDose(litres, strength, 1000);
          const { before, atOnce, equilibrated } = doseEffect(state, dose);
          for (const after of [atOnce, equilibrated]) {
            const volumeL = volumeAfter(before, after, state.temperatureC);
            expect(after.alkalinityMeqL * volumeL).toBeCloseTo(before.alkalinityMeqL + dose.alkalinityMeqL, 9);
            expect(after.calciumMgL * volumeL).toBeCloseTo(before.calciumMgL + dose.calciumMgL, 7);
          }
        },
      ),
    );
  });

  it('plain water only dilutes: salt, alkalinity and calcium fall together', () => {
    const { before, atOnce } = doseEffect(water, limewaterDose(50, 0, 1000));
    expect(atOnce.salinity).toBeCloseTo((35 * 1023.341) / (1023.341 + 0.05 * 997.048), 4);
    expect(atOnce.alkalinityMeqL / before.alkalinityMeqL).toBeCloseTo(atOnce.calciumMgL / before.calciumMgL, 9);
  });

  it('when the limewater replaces what evaporated, salinity stays', () => {
    const dose = limewaterDose(10, 40, 1000, { replacesEvaporation: true });
    const { before, atOnce } = doseEffect(water, dose);
    expect(atOnce.salinity).toBe(35);
    expect(atOnce.alkalinityMeqL - before.alkalinityMeqL).toBeCloseTo(0.4, 9);
    expect(atOnce.calciumMgL - before.calciumMgL).toBeCloseTo(0.4 * 20.039, 9);
  });

  it('no dose changes nothing at once', () => {
    const { before, atOnce } = doseEffect(water, { alkalinityMeqL: 0, calciumMgL: 0 });
    expect(atOnce.phNbs).toBeCloseTo(before.phNbs, 9);
    expect(atOnce.alkalinityMeqL).toBeCloseTo(before.alkalinityMeqL, 12);
  });
});

describe('what kind of dose it is', () => {
  it('more limewater raises pH and saturation at once', () => {
    fc.assert(
      fc.property(
        waters,
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0.01, max: 0.5, noNaN: true }),
        (state, small, more) => {
          const effectOf = (meqL: number) =>
            doseEffect(state, limewaterDose(meqL, 1, 1, { replacesEvaporation: true }));
          const [less, higher] = [effectOf(small), effectOf(small + more)];
          expect(higher.atOnce.phNbs).toBeGreaterThan(less.atOnce.phNbs);
          expect(higher.atOnce.omegaAragonite).toBeGreaterThan(less.atOnce.omegaAragonite);
          expect(higher.atOnce.pco2Uatm).toBeLessThan(less.atOnce.pco2Uatm);
          expect(higher.equilibrated.phNbs).toBeGreaterThan(less.equilibrated.phNbs);
        },
      ),
    );
  });

  it('the same alkalinity as limewater, carbonate or bicarbonate raises pH ever less, and ends the same', () => {
    const [lime, carbonate, bicarbonate] = [0, 0.15, 0.3].map((dicMmolL) =>
      doseEffect(water, { alkalinityMeqL: 0.3, calciumMgL: 0, dicMmolL }),
    );
    expect(lime?.atOnce.phNbs).toBeGreaterThan(carbonate?.atOnce.phNbs ?? 99);
    expect(carbonate?.atOnce.phNbs).toBeGreaterThan(bicarbonate?.atOnce.phNbs ?? 99);
    expect(bicarbonate?.atOnce.phNbs).toBeLessThan(water.phNbs);
    expect(lime?.equilibrated).toEqual(bicarbonate?.equilibrated);
  });

  it('when part of it is acetate, that part counts only in the end', () => {
    const { before, atOnce, equilibrated } = doseEffect(water, {
      ...{ alkalinityMeqL: 0.3, calciumMgL: 6, acetateMeqL: 0.1 },
    });
    expect(atOnce.alkalinityMeqL - before.alkalinityMeqL).toBeCloseTo(0.2, 9);
    expect(equilibrated.alkalinityMeqL - before.alkalinityMeqL).toBeCloseTo(0.3, 9);
  });
});

describe('what it refuses', () => {
  it.each([
    ['Salinity', { salinity: 18 }],
    ['Temperature', { temperatureC: 36 }],
    ['pH', { phNbs: Number.NaN }],
    ['Alkalinity', { alkalinityMeqL: 0 }],
    ['Calcium', { calciumMgL: -1 }],
  ])('when %s is out of range, names it', (name, change) => {
    const error = domainErrorOf(() => doseEffect({ ...water, ...change }, { alkalinityMeqL: 0.1, calciumMgL: 2 }));
    expect(error.code).toBe('domain.out_of_range');
    expect(error.message).toContain(name);
  });

  it.each(['alkalinityMeqL', 'calciumMgL', 'dicMmolL', 'acetateMeqL', 'waterLPerL'])('when %s is negative', (part) => {
    const error = domainErrorOf(() => doseEffect(water, { alkalinityMeqL: 0.1, calciumMgL: 2, [part]: -0.1 }));
    expect(error.code).toBe('domain.out_of_range');
  });

  it('when so much water comes in that it is no reef water any more', () => {
    expect(domainErrorOf(() => doseEffect(water, limewaterDose(900, 40, 1000))).code).toBe('domain.out_of_range');
  });
});
