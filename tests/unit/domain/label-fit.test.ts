import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { calibrationRules, fitFromMeasures, NO_FIT } from '../../../shared/domain/label-fit.ts';
import { LABEL_SHEETS } from '../../../shared/domain/label-sheets.ts';
import { pageOf } from '../../../shared/domain/label-places.ts';
import { domainErrorOf } from '../../support/domain-error.ts';
import { sheetOf } from '../../support/label-sheet.ts';

const rules = calibrationRules(sheetOf('a4-65'));

describe('the rules of a calibration page', () => {
  it.each(LABEL_SHEETS)('of $id lie on its page, with as much room after as before', (sheet) => {
    const { left, top, across, down } = calibrationRules(sheet);

    expect(across).toBeGreaterThan(10);
    expect(down).toBeGreaterThan(10);
    expect(left + across).toBeLessThanOrEqual(pageOf(sheet).width - left);
    expect(top + down).toBeLessThanOrEqual(pageOf(sheet).height - top);
  });

  it('on A4 are 150 mm long and start 20 mm from both edges', () => {
    expect(rules).toEqual({ left: 20, top: 20, across: 150, down: 150 });
  });
});

describe('fitFromMeasures', () => {
  it('when the page came out as it was drawn, changes nothing', () => {
    const { shiftX, shiftY, scaleX, scaleY } = fitFromMeasures(rules, rules);
    expect([shiftX + 0, shiftY + 0, scaleX, scaleY]).toEqual(Object.values(NO_FIT));
  });

  it('when all came 2 mm too far right and 1 mm too high, draws it as much to the other side', () => {
    const fit = fitFromMeasures(rules, { ...rules, left: 22, top: 19 });
    expect(fit).toEqual({ shiftX: -2, shiftY: 1, scaleX: 1, scaleY: 1 });
  });

  it('whatever a printer shifts and stretches within reason, what is drawn with the fit lands where it belongs', () => {
    const axis = fc.record({
      a: fc.double({ min: -10, max: 10, noNaN: true }),
      b: fc.double({ min: 0.96, max: 1.04, noNaN: true }),
    });
    fc.assert(
      fc.property(axis, axis, fc.double({ min: 0, max: 297, noNaN: true }), (across, down, wanted) => {
        const measured = {
          left: across.a + across.b * rules.left,
          top: down.a + down.b * rules.top,
          across: across.b * rules.across,
          down: down.b * rules.down,
        };
        const fit = fitFromMeasures(rules, measured);
        expect(across.a + across.b * (wanted * fit.scaleX + fit.shiftX)).toBeCloseTo(wanted, 9);
        expect(down.a + down.b * (wanted * fit.scaleY + fit.shiftY)).toBeCloseTo(wanted, 9);
      }),
    );
  });

  it.each([
    ['across', 140],
    ['down', 158],
    ['left', 36],
    ['top', 0],
  ] as const)('when %s measures %d mm, is refused at that field', (path, length) => {
    const error = domainErrorOf(() => fitFromMeasures(rules, { ...rules, [path]: length }));
    expect([error.code, error.fields[0]?.path]).toEqual(['input.invalid', path]);
  });
});
