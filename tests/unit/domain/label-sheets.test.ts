import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cornerOf,
  LABEL_SHEET_IDS,
  LABEL_SHEETS,
  labelsOn,
  PAPERS,
  placesFor,
} from '../../../shared/domain/label-sheets.ts';
import reference from '../../reference/labels.json' with { type: 'json' };

const everySheet = LABEL_SHEET_IDS.map((id) => [id, LABEL_SHEETS[id]] as const);

describe('label sheets', () => {
  it.each(reference.sheets)('when the sheet is $id, its measures are those published for it', (published) => {
    const sheet = LABEL_SHEETS[published.id as keyof typeof LABEL_SHEETS];

    expect(labelsOn(sheet)).toBe(published.count);
    expect(sheet).toMatchObject({
      ...{ width: published.label_w_mm, height: published.label_h_mm },
      ...{ columns: published.cols, rows: published.rows },
      ...{ left: published.left_margin_mm, top: published.top_margin_mm },
      ...{ pitchX: published.pitch_x_mm, pitchY: published.pitch_y_mm },
    });
  });

  it.each(everySheet)('when the sheet is %s, every label lies on the paper and beside its neighbours', (_id, sheet) => {
    const paper = PAPERS[sheet.paper];
    const last = cornerOf(sheet, labelsOn(sheet));

    expect(last.x + sheet.width).toBeLessThan(paper.width);
    expect(last.y + sheet.height).toBeLessThan(paper.height);
    expect(sheet.pitchX).toBeGreaterThanOrEqual(sheet.width);
    expect(sheet.pitchY).toBeGreaterThanOrEqual(sheet.height);
  });

  it.each(['plug-square', 'plug-round'] as const)(
    'when the sheet is %s, its margins are equal on opposite sides',
    (id) => {
      const sheet = LABEL_SHEETS[id];
      const last = cornerOf(sheet, labelsOn(sheet));

      expect(PAPERS.A4.width - last.x - sheet.width).toBeCloseTo(sheet.left, 6);
      expect(PAPERS.A4.height - last.y - sheet.height).toBeCloseTo(sheet.top, 6);
    },
  );
});

describe('placesFor', () => {
  it('when a sheet is part-used, starts at the first free place and goes on with a fresh sheet', () => {
    const places = placesFor(LABEL_SHEETS['a4-65'], 4, 63);

    expect(places.map(({ page, place }) => [page, place])).toEqual([
      [0, 63],
      [0, 64],
      [0, 65],
      [1, 1],
    ]);
    expect(places[3]).toMatchObject({ x: 4.699, y: 10.901 });
  });

  it.each([0, 66, 1.5, Number.NaN])('when the start is %s, says which places the sheet has', (start) => {
    expect(() => placesFor(LABEL_SHEETS['a4-65'], 1, start)).toThrow('This sheet has places 1 to 65.');
  });

  it('whatever the run, no two labels share a place and none is left out', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...LABEL_SHEET_IDS),
        fc.integer({ min: 0, max: 700 }),
        fc.integer({ min: 1, max: 65 }),
        (id, labels, start) => {
          const places = placesFor(LABEL_SHEETS[id], labels, start);
          expect(new Set(places.map(({ page, place }) => `${page}/${place}`)).size).toBe(labels);
        },
      ),
    );
  });
});
