import fc from 'fast-check';
import { expect, it } from 'vitest';
import {
  litresAtDepth,
  litresBelowIntake,
  usableLitres,
  type Vessel,
} from '../../../shared/domain/reservoir-vessel.ts';
import { domainErrorOf } from '../../support/domain-error.ts';

const vessel = (fields: Partial<Vessel> = {}): Vessel => ({
  ...{ volumeL: 60, heightMm: null, footprintCm2: null, intakeMm: null },
  ...fields,
});

it('litresAtDepth: area × depth, by hand: 2,000 cm² × 30 cm is 60 L', () => {
  expect(litresAtDepth(vessel({ footprintCm2: 2000 }), 300)).toBeCloseTo(60, 12);
  expect(litresAtDepth(vessel({ footprintCm2: 2000 }), 150)).toBeCloseTo(30, 12);
});

it('litresAtDepth: where only the height is known, the depth counts by its part of it', () => {
  expect(litresAtDepth(vessel({ heightMm: 400 }), 100)).toBeCloseTo(15, 12);
});

it('litresAtDepth: never more than it holds; nothing where its shape is not known', () => {
  expect(litresAtDepth(vessel({ heightMm: 400 }), 500)).toBe(60);
  expect(litresAtDepth(vessel(), 100)).toBeNull();
});

it('litresAtDepth: a depth below the bottom is refused', () => {
  expect(domainErrorOf(() => litresAtDepth(vessel({ heightMm: 400 }), -1)).code).toBe('domain.out_of_range');
});

it('usableLitres: what lies below the intake is never drawn', () => {
  // 38 mm (1.5 in, common practice) of 2,000 cm² are 7.6 L.
  const drum = vessel({ footprintCm2: 2000, heightMm: 300, intakeMm: 38 });

  expect(litresBelowIntake(drum)).toBeCloseTo(7.6, 12);
  expect(usableLitres(drum, 60)).toBeCloseTo(52.4, 12);
  expect(usableLitres(drum, 5)).toBe(0);
});

it('usableLitres: where the intake or the shape is not known, all of it counts', () => {
  expect(usableLitres(vessel({ heightMm: 400 }), 20)).toBe(20);
  expect(usableLitres(vessel({ intakeMm: 38 }), 20)).toBe(20);
});

it('usableLitres: a higher intake never gives more, a higher level never less', () => {
  const mm = fc.double({ min: 0, max: 400, noNaN: true });
  const litres = fc.double({ min: 0, max: 60, noNaN: true });
  fc.assert(
    fc.property(mm, mm, litres, litres, (low, high, less, more) => {
      const at = (intakeMm: number) => vessel({ heightMm: 400, intakeMm });
      const [a, b] = [Math.min(low, high), Math.max(low, high)];
      expect(usableLitres(at(b), less)).toBeLessThanOrEqual(usableLitres(at(a), less));
      expect(usableLitres(at(a), Math.max(less, more))).toBeGreaterThanOrEqual(
        usableLitres(at(a), Math.min(less, more)),
      );
    }),
  );
});
