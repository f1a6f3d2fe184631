import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { solveCarbonate } from '../../../shared/domain/carbonate/solve.ts';
import type { WaterState } from '../../../shared/domain/dose-effect.ts';
import { largestOverfill, litresRunIn, overfill, type OverfillRisk } from '../../../shared/domain/overfill.ts';
import { seawaterDensity } from '../../../shared/domain/seawater.ts';
import { MEQ_PER_DKH } from '../../../shared/domain/units.ts';
import { domainErrorOf } from '../../support/domain-error.ts';
import reference from '../../reference/limewater-dose.json' with { type: 'json' };

const limits = { ph: 8.5, omegaAragonite: 7, changeMeqL: 1.4 * MEQ_PER_DKH };
const none = { ph: 14, omegaAragonite: 1000, changeMeqL: 1000 };

function aRisk(changes: Partial<OverfillRisk> = {}, water: Partial<WaterState> = {}): OverfillRisk {
  return {
    water: { salinity: 35, temperatureC: 25, alkalinityMeqL: 2.9, calciumMgL: 420, phNbs: 8.2, ...water },
    ...{ systemVolumeL: 2000, strengthMeqL: 40.3, ...changes },
  };
}

describe('an overfill', () => {
  it('raises alkalinity by what it brings, less what its water dilutes (114 dKH × litres / volume)', () => {
    const { effect } = overfill(aRisk(), 20, limits);
    const before = effect?.before.alkalinityMeqL ?? 0;
    const mixed = (before * 2000 + 20 * 40.3) / 2020;
    // Mass is kept, not volume: seawater and fresh water shrink by some 1e-4 when mixed.
    expect(effect?.equilibrated.alkalinityMeqL).toBeCloseTo(mixed, 3);
    expect(effect?.equilibrated.salinity).toBeCloseTo((35 * 2000) / 2020, 1);
  });

  it.each(reference.doses.filter(({ limeUmolKg }) => limeUmolKg > 0))(
    'of case $id without its water is the dose of the reference (PyCO2SYS), when mixed and in balance',
    (given) => {
      const { salinity, temperatureC, calciumMgL, alkalinityUmolKg, roomPco2Uatm } = given;
      const phNbs = solveCarbonate({ salinity, temperatureC, alkalinityUmolKg, ph: given.phTotal }).phNbs;
      const density = seawaterDensity(salinity, temperatureC) / 1000;
      const water = { salinity, temperatureC, calciumMgL, phNbs, alkalinityMeqL: (alkalinityUmolKg * density) / 1000 };
      // A strength so high that its water dilutes by less than the tolerance.
      const strengthMeqL = 1e9;
      const litres = (2 * given.limeUmolKg * density) / 1000 / strengthMeqL;
      const { effect } = overfill({ water, systemVolumeL: 1, strengthMeqL, roomPco2Uatm }, litres, none);

      expect(effect?.atOnce.phTotal).toBeCloseTo(given.after.phTotal, 6);
      expect(effect?.atOnce.omegaAragonite).toBeCloseTo(given.after.omegaAragonite, 4);
      expect(effect?.equilibrated.phTotal).toBeCloseTo(given.equilibrated.phTotal, 6);
    },
  );

  it('when nothing runs in, changes nothing and breaks nothing', () => {
    const { effect, broken } = overfill(aRisk(), 0, limits);
    expect(broken).toEqual([]);
    expect(effect?.atOnce.phNbs).toBeCloseTo(8.2, 6);
  });

  it('when a whole drum runs into a small system, breaks all three limits', () => {
    expect(overfill(aRisk({ systemVolumeL: 400 }), 40, limits).broken).toEqual(['ph', 'omega', 'change']);
  });

  it('when the water would hardly be seawater any more, says that it can’t be reckoned', () => {
    expect(overfill(aRisk({ systemVolumeL: 100 }), 150, limits)).toEqual({
      ...{ litres: 150, effect: null },
      broken: ['beyond'],
    });
  });

  it('with vinegar in it lifts the pH less at once', () => {
    const [plain, withVinegar] = [{}, { acetateMeqL: 4 }].map((changes) => overfill(aRisk(changes), 20, none));
    expect(withVinegar?.effect?.atOnce.phNbs).toBeLessThan(plain?.effect?.atOnce.phNbs ?? 0);
  });

  it('when the water as it stands can’t be true, is refused', () => {
    expect(domainErrorOf(() => overfill(aRisk({}, { salinity: 3 }), 1, limits)).code).toBe('domain.out_of_range');
    expect(domainErrorOf(() => overfill(aRisk({ systemVolumeL: 0 }), 1, limits)).code).toBe('domain.out_of_range');
    expect(domainErrorOf(() => overfill(aRisk(), -1, limits)).code).toBe('domain.out_of_range');
  });
});

describe('the largest overfill within the limits', () => {
  const risks = fc.record({
    alkalinityMeqL: fc.double({ min: 2, max: 4.5, noNaN: true }),
    phNbs: fc.double({ min: 7.9, max: 8.45, noNaN: true }),
    strengthMeqL: fc.double({ min: 5, max: 45, noNaN: true }),
    systemVolumeL: fc.double({ min: 200, max: 20_000, noNaN: true }),
  });

  it('breaks no limit, and a little more breaks the one that is named', () => {
    fc.assert(
      fc.property(risks, ({ alkalinityMeqL, phNbs, ...rest }) => {
        const risk = aRisk(rest, { alkalinityMeqL, phNbs });
        const { litres, stoppedBy } = largestOverfill(risk, 500, limits);
        expect(overfill(risk, litres, limits).broken.length === 0 || litres === 0).toBe(true);
        if (stoppedBy !== null && litres > 0) {
          expect(overfill(risk, litres * 1.0001 + 1e-6, limits).broken).toContain(stoppedBy);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('grows with the system and shrinks with the strength', () => {
    const most = (changes: Partial<OverfillRisk>) => largestOverfill(aRisk(changes), 500, limits).litres;
    expect(most({ systemVolumeL: 4000 })).toBeCloseTo(2 * most({ systemVolumeL: 2000 }), 3);
    expect(most({ strengthMeqL: 20 })).toBeGreaterThan(most({ strengthMeqL: 40 }));
  });

  it('when the water is over a limit already, is nothing', () => {
    expect(largestOverfill(aRisk({}, { phNbs: 8.6 }), 100, limits)).toEqual({ litres: 0, stoppedBy: 'ph' });
  });

  it('when even all of it stays within, is all of it', () => {
    expect(largestOverfill(aRisk({ systemVolumeL: 20_000 }), 5, limits)).toEqual({ litres: 5, stoppedBy: null });
  });
});

describe('what runs in', () => {
  it('is all that may be drawn, or what the pump moves in its hours where that is less', () => {
    expect(litresRunIn(60)).toBe(60);
    expect(litresRunIn(60, { litresPerHour: 6, hours: 8 })).toBe(48);
    expect(litresRunIn(60, { litresPerHour: 6, hours: 24 })).toBe(60);
  });
});
