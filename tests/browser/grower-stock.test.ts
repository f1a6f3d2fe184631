import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { placesFor } from '../../shared/domain/label-places.ts';
import { formatPlugCode, parsePlugCode } from '../../shared/domain/plug-code.ts';
import { cameraFlags, writeCameraFile } from '../support/fake-camera.ts';
import { sheetOf } from '../support/label-sheet.ts';
import { crop, type GreyPicture, printPdf, readQrCodes } from '../support/read-labels.ts';
import { choose, heading } from './support/acts.ts';
import { useSite } from './support/use-site.ts';

const site = useSite();
const folder = mkdtempSync(path.join(tmpdir(), 'limestead-camera-'));
afterAll(() => {
  rmSync(folder, { recursive: true });
});

interface Plug {
  state: string;
  rack: { code: string } | null;
  position: string | null;
  size: { mm: number };
}
const plugOf = (page: Page, code: string) => site().get<Plug>(page, `/api/plugs/${code}`);

/** Logs a cut of three pieces of a rested mother onto a rack with room. */
async function logCut(page: Page): Promise<void> {
  const { items } = await site().get<{ items: { colony: { id: string; rested: boolean; health: string } }[] }>(
    page,
    '/api/cutting',
  );
  const mother = items.find(({ colony }) => colony.rested && colony.health === 'good');
  await page.goto(`/cutting/log?colonyId=${mother?.colony.id ?? ''}`);
  await page.getByLabel('Pieces mounted').fill('3');
  await choose(page, 'Rack', await rackWithRoom(page));
  await page.getByRole('button', { name: 'Log cut' }).click();
  await page.getByRole('link', { name: 'Print labels' }).waitFor();
}

async function rackWithRoom(page: Page, but = ''): Promise<RegExp> {
  const racks = await site().get<{
    items: { code: string; systemKind: string; plugs: number; rows: number; columns: number }[];
  }>(page, '/api/racks');
  const rack = racks.items.find(
    ({ code, systemKind, plugs, rows, columns }) =>
      code !== but && systemKind === 'growout' && plugs + 5 < rows * columns,
  );
  if (!rack) throw new Error('No rack of the demo has room.');
  return new RegExp(`^${rack.code}\\b`);
}

it('when a cut is logged on a phone, its printed label leads the camera to the plug', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  await logCut(page);
  await page.getByRole('link', { name: 'Print labels' }).click();
  await heading(page, /^Labels: /);
  const file = page.waitForResponse(/\/api\/labels\/prints\/.+\/file$/);
  await page.getByRole('button', { name: 'Make the PDF' }).click();
  await page.getByRole('link', { name: 'Open to print' }).waitFor();
  // The browser keeps no copy of a file that a page took as a whole: it is made once more.
  const pdf = await (await page.request.get((await file).url())).body();
  const [sheet] = printPdf(pdf, 300);
  if (!sheet) throw new Error('The PDF has no page.');
  const texts = await readQrCodes(sheet);
  expect(texts).toHaveLength(3);

  const label = firstLabelOf(sheet);
  const [text = ''] = await readQrCodes(label);
  const code = codeIn(text);
  const video = path.join(folder, 'camera.y4m');
  writeCameraFile(video, [label]);
  const browser = await site().openBrowser(cameraFlags(video));
  const phone = await site().newPage({ as: 'grower', device: 'phone', browser });
  await phone.goto('/scan');
  await phone.getByRole('heading', { name: formatPlugCode(code) }).waitFor();
  await phone.getByRole('link', { name: 'Open', exact: true }).click();

  await heading(phone, formatPlugCode(code));
  expect(new URL(phone.url()).pathname).toBe(`/stock/plugs/${code}`);
});

it('when plugs are moved, lost and measured by scans, each act is done, and undone where it was a slip', async () => {
  const page = await site().newPage({ as: 'grower', device: 'phone' });
  await logCut(page);
  const codes = await page.locator('.new-plugs a').allInnerTexts();
  const [moved = '', lost = '', measured = ''] = codes.map((text) => codeIn(text));
  const before = await plugOf(page, moved);
  const target = await rackWithRoom(page, before.rack?.code);
  const scan = async (code: string) => {
    await page.getByLabel('Code of a plug or a rack').fill(code);
    await page.getByRole('button', { name: 'Read' }).click();
  };
  await page.goto('/scan');

  await page.getByRole('radio', { name: 'Move' }).click();
  await choose(page, 'To rack', target);
  await scan(moved);
  await page.getByText('1 done').waitFor();
  expect((await plugOf(page, moved)).rack?.code).toMatch(target);

  await page.getByRole('radio', { name: 'Loss' }).click();
  await choose(page, 'What was seen', /./);
  await scan(lost);
  await page.getByText('2 done').waitFor();
  expect((await plugOf(page, lost)).state).toBe('gone');
  await page.getByRole('button', { name: 'Undo' }).first().click();
  await page.getByText('1 done').waitFor();
  expect((await plugOf(page, lost)).state).not.toBe('gone');

  await page.getByRole('radio', { name: 'Measure' }).click();
  await scan(measured);
  await page.getByLabel(`Size of ${formatPlugCode(measured)}`).fill('23.5');
  await page.getByRole('button', { name: 'Save' }).click();
  await page.getByText('2 done').waitFor();
  expect((await plugOf(page, measured)).size.mm).toBeCloseTo(23.5, 1);
});

function codeIn(text: string): string {
  const parsed = parsePlugCode(text);
  if (!('code' in parsed)) throw new Error(`${text} is no plug code.`);
  return parsed.code;
}

const DOTS_PER_MM = 300 / 25.4;

/** What a phone held close to the sheet sees: the first label alone. */
function firstLabelOf(page: GreyPicture): GreyPicture {
  const sheet = sheetOf('a4-65');
  const [place] = placesFor(sheet, 1, 1);
  if (!place) throw new Error('The sheet has no labels.');
  const px = (mm: number) => Math.round(mm * DOTS_PER_MM);
  return crop(page, px(place.x), px(place.y), px(sheet.width), px(sheet.height));
}
