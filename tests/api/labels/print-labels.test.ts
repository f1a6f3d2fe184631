import { eq } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { orders } from '../../../server/db/schema/index.ts';
import type { LabelSubject } from '../../../shared/contracts/labels.ts';
import { calibrationRules } from '../../../shared/domain/label-fit.ts';
import { labelsOn, placesFor } from '../../../shared/domain/label-places.ts';
import { LABEL_SHEETS, type LabelSheet } from '../../../shared/domain/label-sheets.ts';
import { bytesOf } from '../../support/download.ts';
import { givenLabelledBatch } from '../../support/given-labels.ts';
import { givenOffer, givenOrder } from '../../support/given-orders.ts';
import { sheetOf } from '../../support/label-sheet.ts';
import { crop, darkBounds, type GreyPicture, printPdf, readQrCodes } from '../../support/read-labels.ts';
import { startFarm, type TestClient } from '../../support/start-farm.ts';

const DPI = 300;
const PIXELS_PER_MM = DPI / 25.4;
const px = (mm: number) => Math.round(mm * PIXELS_PER_MM);

interface Run {
  subject: LabelSubject & { from?: number; to?: number };
  stockId: string;
  start?: number;
  printer?: string;
  edges?: boolean;
}

async function printed(client: TestClient, run: Run): Promise<GreyPicture[]> {
  const noted = await client.post('/api/labels/prints').send(run);
  expect(noted.status).toBe(201);
  return pagesOf(client, `/api/labels/prints/${noted.body.id}/file`);
}

async function pagesOf(client: TestClient, address: string): Promise<GreyPicture[]> {
  const reply = await bytesOf(client.get(address));
  expect(reply.status).toBe(200);
  expect(reply.headers['content-type']).toBe('application/pdf');
  return printPdf(reply.body as Buffer, DPI);
}

/** Reads each label by itself, from just the area that its sheet gives it. */
async function readEach(sheet: LabelSheet, pages: GreyPicture[], labels: number, start = 1): Promise<string[][]> {
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
  it.each(LABEL_SHEETS)(
    'when a full page of $id is printed at 300 dpi, every code on it is read',
    async (sheet) => {
      const farm = await startFarm();
      const { batchId, codes } = givenLabelledBatch(farm, { pieces: labelsOn(sheet) });
      const grower = await farm.as('grower');

      const pages = await printed(grower, { subject: { batchId }, stockId: sheet.id });

      expect(pages).toHaveLength(1);
      expect(await readEach(sheet, pages, codes.length)).toEqual(codes.map(addressOf));
    },
    60_000,
  );

  it.each([
    ['a4-65', 210, 297],
    ['letter-80', 215.9, 279.4],
    ['roll-51', 50.8, 25.4],
  ] as const)('when %s is printed, the page measures %s × %s mm', async (stockId, width, height) => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm);

    const [page] = await printed(await farm.as('grower'), { subject: { batchId }, stockId });

    expect((page?.width ?? 0) / PIXELS_PER_MM).toBeCloseTo(width, 0);
    expect((page?.height ?? 0) / PIXELS_PER_MM).toBeCloseTo(height, 0);
  });

  it.each(LABEL_SHEETS.filter(({ paper }) => paper !== 'roll'))(
    'when edges of $id are drawn, labels lie within 0.2 mm of where they are cut',
    async (sheet) => {
      const farm = await startFarm();
      const { batchId } = givenLabelledBatch(farm, { pieces: labelsOn(sheet) });

      const [page] = await printed(await farm.as('grower'), { subject: { batchId }, stockId: sheet.id, edges: true });

      // Edges are grey and thinner than a dot, so any shade counts.
      const inMm = boundsInMm(page, 250);
      const right = sheet.left + (sheet.columns - 1) * sheet.pitchX + sheet.width;
      const bottom = sheet.top + (sheet.rows - 1) * sheet.pitchY + sheet.height;
      expect(Math.abs(inMm.left - sheet.left)).toBeLessThan(0.2);
      expect(Math.abs(inMm.top - sheet.top)).toBeLessThan(0.2);
      expect(Math.abs(inMm.right - right)).toBeLessThan(0.2);
      expect(Math.abs(inMm.bottom - bottom)).toBeLessThan(0.2);
    },
  );

  it('when the sheet is part-used and the printer is off, starts there and shifts every label', async () => {
    const farm = await startFarm();
    const { batchId, codes } = givenLabelledBatch(farm, { pieces: 4 });
    const grower = await farm.as('grower');
    const run = { subject: { batchId }, stockId: 'a4-189', start: 187 };
    const rules = calibrationRules(sheetOf('a4-189'));
    const fit = { stockId: 'a4-189', printer: 'Wet room', ...rules, left: rules.left - 2, top: rules.top + 1.5 };
    expect((await grower.put('/api/label-fits').send(fit)).status).toBe(200);

    const straight = await printed(grower, run);
    const shifted = await printed(grower, { ...run, printer: 'Wet room' });

    expect(await readEach(sheetOf('a4-189'), straight, 4, 187)).toEqual(codes.map(addressOf));
    const [before, after] = [boundsInMm(straight[1]), boundsInMm(shifted[1])];
    expect(after.left - before.left).toBeCloseTo(2, 0);
    expect(after.top - before.top).toBeCloseTo(-1.5, 0);
  });

  it('when single plugs are printed again, their labels come in the order given', async () => {
    const farm = await startFarm();
    const { codes } = givenLabelledBatch(farm, { pieces: 6 });
    const wanted = [codes[4] ?? '', codes[1] ?? ''];
    const subject = { codes: wanted.join(',').toLowerCase() };

    const pages = await printed(await farm.as('sales'), { subject, stockId: 'letter-80' });

    expect(await readEach(sheetOf('letter-80'), pages, 2)).toEqual(wanted.map(addressOf));
  });

  it('when a part of a batch is printed on a roll, each label is a page of its own', async () => {
    const farm = await startFarm();
    const { batchId, codes } = givenLabelledBatch(farm, { pieces: 6 });

    const pages = await printed(await farm.as('grower'), { subject: { batchId, from: 3, to: 5 }, stockId: 'roll-25' });

    expect(pages).toHaveLength(3);
    expect(await readEach(sheetOf('roll-25'), pages, 3)).toEqual(codes.slice(2, 5).map(addressOf));
  });

  it('when a rack, its tank or a box is printed, its code leads there', async () => {
    const farm = await startFarm();
    const { rackCode } = givenLabelledBatch(farm);
    const { id: orderId, number } = givenOrder(farm, [{ offer: givenOffer(farm), quantity: 1 }]);
    farm.db.update(orders).set({ boxes: 2 }).where(eq(orders.id, orderId)).run();
    const grower = await farm.as('grower');
    const read = async (subject: LabelSubject, labels: number) =>
      readEach(sheetOf('a4-65'), await printed(grower, { subject, stockId: 'a4-65' }), labels);

    expect(await read({ racks: rackCode }, 1)).toEqual([[`HTTP://FARM.EXAMPLE.COM/R/${rackCode}`]]);
    expect(await read({ tanks: 't-wig' }, 1)).toEqual([['HTTP://FARM.EXAMPLE.COM/T/T-WIG']]);
    expect(await read({ orderId }, 2)).toEqual([
      [`HTTP://FARM.EXAMPLE.COM/B/${number}-1`],
      [`HTTP://FARM.EXAMPLE.COM/B/${number}-2`],
    ]);
  });

  it('when many labels are printed on a roll, each has its page and their count is told', async () => {
    const farm = await startFarm();
    const { batchId } = givenLabelledBatch(farm, { pieces: 500 });
    const grower = await farm.as('grower');
    const noted = await grower.post('/api/labels/prints').send({ subject: { batchId }, stockId: 'roll-25' });

    const progress = await grower.get(`/api/labels/prints/${noted.body.id}/progress`);
    const { body } = await bytesOf(grower.get(`/api/labels/prints/${noted.body.id}/file`));

    expect(progress.body).toEqual({ done: 0, labels: 500 });
    expect((body as Buffer).toString('latin1')).toContain('/Count 500');
  });
});

describe('a calibration page', { timeout: 60_000 }, () => {
  it.each(LABEL_SHEETS)('of $id holds rules of the length that its fit is reckoned by', async (sheet) => {
    const farm = await startFarm();

    const [page] = await pagesOf(await farm.as('grower'), `/api/label-stocks/${sheet.id}/calibration`);

    if (!page) throw new Error('No page was printed.');
    const { left, top, across, down } = calibrationRules(sheet);
    // The lines themselves: where nothing but the rule is, one pixel beside its corner.
    const isDark = (x: number, y: number) => darkBounds(crop(page, px(x) - 2, px(y) - 2, 5, 5), 128).right >= 0;
    expect([isDark(left, top), isDark(left + across, top), isDark(left, top + down)]).toEqual([true, true, true]);
  });
});

function boundsInMm(page: GreyPicture | undefined, limit?: number) {
  const { left, top, right, bottom } = darkBounds(page ?? { width: 0, height: 0, pixels: new Uint8Array() }, limit);
  const mm = (at: number) => (at + 0.5) / PIXELS_PER_MM;
  return { left: mm(left), top: mm(top), right: mm(right), bottom: mm(bottom) };
}
