import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { prepareZXingModule, readBarcodes } from 'zxing-wasm/reader';

/** A grey picture: one byte a pixel, rows from the top, 255 is white. */
export interface GreyPicture {
  width: number;
  height: number;
  pixels: Uint8Array;
}

prepareZXingModule({
  overrides: {
    wasmBinary: new Uint8Array(
      readFileSync(createRequire(import.meta.url).resolve('zxing-wasm/reader/zxing_reader.wasm')),
    ).buffer,
  },
});

/** Every page of a PDF as a printer of this resolution would see it, drawn by poppler. */
export function printPdf(pdf: Buffer, dotsPerInch: number): GreyPicture[] {
  const folder = mkdtempSync(path.join(tmpdir(), 'limestead-print-'));
  try {
    const file = path.join(folder, 'sheet.pdf');
    writeFileSync(file, pdf);
    execFileSync('pdftoppm', ['-r', String(dotsPerInch), '-gray', file, path.join(folder, 'page')]);
    return readdirSync(folder)
      .filter((name) => name.endsWith('.pgm'))
      .sort()
      .map((name) => readPgm(readFileSync(path.join(folder, name))));
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** The part of a picture that starts at `x`, `y`; what lies outside of the picture is white. */
export function crop(picture: GreyPicture, x: number, y: number, width: number, height: number): GreyPicture {
  const pixels = new Uint8Array(width * height).fill(255);
  const [left, right] = [Math.max(0, x), Math.min(picture.width, x + width)];
  for (let row = Math.max(0, -y); row < Math.min(height, picture.height - y); row += 1) {
    const start = (y + row) * picture.width;
    pixels.set(picture.pixels.subarray(start + left, start + right), row * width + left - x);
  }
  return { width, height, pixels };
}

/** The texts of the QR codes in a picture, read by the engine that the scan page uses. */
export async function readQrCodes(picture: GreyPicture): Promise<string[]> {
  const data = new Uint8ClampedArray(picture.pixels.length * 4);
  picture.pixels.forEach((grey, index) => data.set([grey, grey, grey, 255], index * 4));
  const found = await readBarcodes(
    { data, width: picture.width, height: picture.height, colorSpace: 'srgb' } as ImageData,
    { formats: ['QRCode'], maxNumberOfSymbols: 255 },
  );
  return found.filter(({ isValid }) => isValid).map(({ text }) => text);
}

/** The dark part of a picture: first and last column and row with a pixel darker than `limit`, both inside. */
export function darkBounds(
  picture: GreyPicture,
  limit = 128,
): { left: number; top: number; right: number; bottom: number } {
  const bounds = { left: picture.width, top: picture.height, right: -1, bottom: -1 };
  for (let y = 0; y < picture.height; y += 1) {
    const row = picture.pixels.subarray(y * picture.width, (y + 1) * picture.width);
    const left = row.findIndex((grey) => grey < limit);
    if (left < 0) continue;
    bounds.left = Math.min(bounds.left, left);
    bounds.right = Math.max(
      bounds.right,
      row.findLastIndex((grey) => grey < limit),
    );
    bounds.top = Math.min(bounds.top, y);
    bounds.bottom = y;
  }
  return bounds;
}

/** Binary grey map of netpbm: `P5`, width, height and 255, then one byte a pixel. */
function readPgm(file: Buffer): GreyPicture {
  const head = /^P5\s+(\d+)\s+(\d+)\s+255\s/.exec(file.subarray(0, 64).toString('latin1'));
  if (!head) throw new Error('This is not a grey map of netpbm.');
  const [width, height] = [Number(head[1]), Number(head[2])];
  return { width, height, pixels: new Uint8Array(file.subarray(head[0].length, head[0].length + width * height)) };
}
