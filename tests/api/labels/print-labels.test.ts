import { describe, expect, it } from 'vitest';
import {
  type LabelSheetId,
  LABEL_SHEET_IDS,
  LABEL_SHEETS,
  labelsOn,
  placesFor,
} from '../../../shared/domain/label-sheets.ts';
import { bytesOf } from '../../support/download.ts';
import { givenLabelledBatch } from '../../support/given-labels.ts';
import { crop, darkBounds, type GreyPicture, printPdf, readQrCodes } from '../../support/read-labels.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';

const DPI = 300;
const PIXELS_PER_MM = DPI / 25.4;
const px = (mm: number) => Math.round(mm * PIXELS_PER_MM);

async function printed(client: TestClient, query: Record<string, string>): Promise<GreyPicture[]> {
  const reply = await bytesOf(client.get(`/api/labels?${new URLSearchParams(query).toString()}`));
  expect(reply.status).toBe(200);
  expect(reply.headers['content-type']).toBe('application/pdf');
  return printPdf(reply.body as Buffer, DPI);
}

/** Reads each label by itself, from just the area that its sheet gives it. */
async function readEach(sheetId: LabelSheetId, pages: GreyPicture[], labels: number, start = 1): Promise<string[][]> {
  const sheet = LABEL_SHEETS[sheetId];
  const texts: string[][] = [];
  for (const { page, x, y } of placesFor(sheet, labels, start)) {
    const picture = pages[page];
    if (!picture) throw new Error(`Page ${page} was not printed.`);
    texts.push(await readQrCodes(crop(picture, px(x), px(y), px(sheet.width), px(sheet.height))));
  }
  return texts;
}

const addressOf = (code: string) => [`HTTP://FARM.EXAMPLE.COM/P/${code}`];

// Drawing and reading whole pages takes its time on a small machine.
describe('a printed sheet', { timeout: 60_000 }, () => {
  it.each(LABEL_SHEET_IDS)(
    'when a full page of %s is printed at 300 dpi, every code on it is read',
    async (sheet) => {
      const farm = await startFarm();
      const { batchId, codes } = givenLabelledBatch(farm, { pieces: labelsOn(LABEL_SHEETS[sheet]) });
      const grower = await farm.as('grower');

      const pages = await printed(grower, { batchId, sheet });

      expect(pages).toHaveLength(1);
      expect(await readEach(sheet, pages, codes.length)).toEqual(codes.map(addressOf));
    },
    60_000,
  );

  it.each([
    ['a4-65', 210, 297],
    ['letter-80', 215.9, 279.4],
  ] as const)('when %s is printed, the page measures %s × %s mm', async (sheet, width, height) => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm);

    const [page] = await printed(await farm.as('grower'), { batchId, sheet });

    expect((page?.width ?? 0) / PIXELS_PER_MM).toBeCloseTo(width, 0);
    expect((page?.height ?? 0) / PIXELS_PER_MM).toBeCloseTo(height, 0);
  });

  it.each(LABEL_SHEET_IDS)(
    'when edges of %s are drawn, labels lie within 0.2 mm of where they are cut',
    async (sheetId) => {
      const farm = await startFarm();
      const sheet = LABEL_SHEETS[sheetId];
      const { batchId } = givenLabelledBatch(farm, { pieces: labelsOn(sheet) });

      const [page] = await printed(await farm.as('grower'), { batchId, sheet: sheetId, edges: '1' });

      // Edges are grey and thinner than a dot, so any shade counts.
      const edges = darkBounds(page ?? { width: 0, height: 0, pixels: new Uint8Array() }, 250);
      const inMm = Object.fromEntries(Object.entries(edges).map(([side, at]) => [side, (at + 0.5) / PIXELS_PER_MM]));
      const right = sheet.left + (sheet.columns - 1) * sheet.pitchX + sheet.width;
      const bottom = sheet.top + (sheet.rows - 1) * sheet.pitchY + sheet.height;
      expect(Math.abs((inMm.left ?? 0) - sheet.left)).toBeLessThan(0.2);
      expect(Math.abs((inMm.top ?? 0) - sheet.top)).toBeLessThan(0.2);
      expect(Math.abs((inMm.right ?? 0) - right)).toBeLessThan(0.2);
      expect(Math.abs((inMm.bottom ?? 0) - bottom)).toBeLessThan(0.2);
    },
  );

  it('when the sheet is part-used and the printer is off, starts there and shifts every label', async () => {
    const farm = await startFarm();
    const { batchId, codes } = givenLabelledBatch(farm, { pieces: 4 });
    const grower = await farm.as('grower');

    const straight = await printed(grower, { batchId, sheet: 'a4-189', start: '187' });
    const shifted = await printed(grower, { batchId, sheet: 'a4-189', start: '187', shiftX: '2', shiftY: '-1.5' });

    expect(await readEach('a4-189', straight, 4, 187)).toEqual(codes.map(addressOf));
    const [before, after] = [straight[1], shifted[1]].map((page) => page && darkBounds(page));
    expect(((after?.left ?? 0) - (before?.left ?? 0)) / PIXELS_PER_MM).toBeCloseTo(2, 0);
    expect(((after?.top ?? 0) - (before?.top ?? 0)) / PIXELS_PER_MM).toBeCloseTo(-1.5, 0);
  });

  it('when single plugs are printed again, their labels come in the order given', async () => {
    const farm = await startFarm();
    const { codes } = givenLabelledBatch(farm, { pieces: 6 });
    const wanted = [codes[4] ?? '', codes[1] ?? ''];

    const pages = await printed(await farm.as('sales'), { codes: wanted.join(',').toLowerCase(), sheet: 'letter-80' });

    expect(await readEach('letter-80', pages, 2)).toEqual(wanted.map(addressOf));
  });

  it('when a rack is printed, its code leads to the rack', async () => {
    const farm = await startFarm();
    const { rackCode } = givenLabelledBatch(farm);

    const pages = await printed(await farm.as('grower'), { racks: rackCode, sheet: 'a4-65' });

    expect(await readEach('a4-65', pages, 1)).toEqual([[`HTTP://FARM.EXAMPLE.COM/R/${rackCode}`]]);
  });
});
