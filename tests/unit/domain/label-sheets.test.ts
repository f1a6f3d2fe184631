import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  assertMeasures,
  cornerOf,
  labelsOn,
  measureProblems,
  pageOf,
  placesFor,
} from '../../../shared/domain/label-places.ts';
import { LABEL_SHEETS, type LabelMeasures, rollOf } from '../../../shared/domain/label-sheets.ts';
import { domainErrorOf } from '../../support/domain-error.ts';
import { sheetOf } from '../../support/label-sheet.ts';
import reference from '../../reference/labels.json' with { type: 'json' };

const everySheet = LABEL_SHEETS.map((sheet) => [sheet.id, sheet] as const);

describe('label sheets', () => {
  it.each(reference.sheets)('when the sheet is $id, its measures are those published for it', (published) => {
    const sheet = sheetOf(published.id);

    expect(labelsOn(sheet)).toBe(published.count);
    expect(sheet).toMatchObject({
      ...{ width: published.label_w_mm, height: published.label_h_mm },
      ...{ columns: published.cols, rows: published.rows },
      ...{ left: published.left_margin_mm, top: published.top_margin_mm },
      ...{ pitchX: published.pitch_x_mm, pitchY: published.pitch_y_mm },
    });
  });

  it.each(everySheet)('when the sheet is %s, every label lies on the paper and beside its neighbours', (_id, sheet) => {
    expect(measureProblems(sheet)).toEqual([]);
    const last = cornerOf(sheet, labelsOn(sheet));
    expect(last.x + sheet.width).toBeLessThanOrEqual(pageOf(sheet).width);
    expect(last.y + sheet.height).toBeLessThanOrEqual(pageOf(sheet).height);
  });

  it.each(['plug-square', 'plug-round'] as const)(
    'when the sheet is %s, its margins are equal on opposite sides',
    (id) => {
      const sheet = sheetOf(id);
      const last = cornerOf(sheet, labelsOn(sheet));

      expect(pageOf(sheet).width - last.x - sheet.width).toBeCloseTo(sheet.left, 6);
      expect(pageOf(sheet).height - last.y - sheet.height).toBeCloseTo(sheet.top, 6);
    },
  );
});

describe('placesFor', () => {
  it('when a sheet is part-used, starts at the first free place and goes on with a fresh sheet', () => {
    const places = placesFor(sheetOf('a4-65'), 4, 63);

    expect(places.map(({ page, place }) => [page, place])).toEqual([
      [0, 63],
      [0, 64],
      [0, 65],
      [1, 1],
    ]);
    expect(places[3]).toMatchObject({ x: 4.699, y: 10.901 });
  });

  it.each([0, 66, 1.5, Number.NaN])('when the start is %s, says which places the sheet has', (start) => {
    expect(() => placesFor(sheetOf('a4-65'), 1, start)).toThrow('This sheet has places 1 to 65.');
  });

  it('whatever the run, no two labels share a place and none is left out', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...LABEL_SHEETS),
        fc.integer({ min: 0, max: 700 }),
        fc.integer({ min: 1, max: 65 }),
        (sheet, labels, start) => {
          const places = placesFor(sheet, labels, Math.min(start, labelsOn(sheet)));
          expect(new Set(places.map(({ page, place }) => `${page}/${place}`)).size).toBe(labels);
        },
      ),
    );
  });
});

describe('the measures of a label stock', () => {
  const good = sheetOf('a4-65');

  it.each<[string, Partial<LabelMeasures>, string]>([
    ['columns overlap', { pitchX: 38 }, 'pitchX'],
    ['rows overlap', { pitchY: 21 }, 'pitchY'],
    ['the last column leaves the paper', { left: 10 }, 'pitchX'],
    ['the last row leaves the paper', { rows: 14 }, 'pitchY'],
    ['one label is wider than the paper', { columns: 1, width: 220 }, 'width'],
    ['a round is not round', { shape: 'round' }, 'height'],
    ['a roll has a second column', { ...rollOf(20, 10), columns: 2 }, 'columns'],
    ['a roll has a margin', { ...rollOf(20, 10), left: 1 }, 'left'],
  ])('when %s, are refused at the field', (_, change, path) => {
    const error = domainErrorOf(() => {
      assertMeasures({ ...good, ...change });
    });

    expect(error.code).toBe('input.invalid');
    expect(error.fields.map((field) => field.path)).toContain(path);
  });
});
