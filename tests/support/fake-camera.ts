import { writeFileSync } from 'node:fs';
import type { GreyPicture } from './read-labels.ts';

const WIDTH = 640;
const HEIGHT = 480;
/** Chroma without colour. */
const GREY = 128;

/**
 * Writes what a camera held over a picture would see, as the raw video that Chromium takes for
 * `--use-file-for-fake-video-capture`. Chromium plays it over and over.
 *
 * @param pictures shown one after the other, each for `framesEach` tenths of a second, as large as fits
 * @see the YUV4MPEG2 format of mjpegtools: a text header, then FRAME and the planes Y, U, V of each frame
 */
export function writeCameraFile(file: string, pictures: readonly GreyPicture[], framesEach = 10): void {
  const header = Buffer.from(`YUV4MPEG2 W${WIDTH} H${HEIGHT} F10:1 Ip A1:1 C420jpeg\n`);
  const frames = pictures.flatMap((picture) => {
    const frame = Buffer.concat([Buffer.from('FRAME\n'), lumaOf(picture), Buffer.alloc((WIDTH * HEIGHT) / 2, GREY)]);
    return Array.from({ length: framesEach }, () => frame);
  });
  writeFileSync(file, Buffer.concat([header, ...frames]));
}

/** Flags that give Chromium this camera, allowed without asking. */
export function cameraFlags(file: string): string[] {
  return [
    '--use-fake-ui-for-media-stream',
    '--use-fake-device-for-media-stream',
    `--use-file-for-fake-video-capture=${file}`,
  ];
}

/** The picture in the middle of a grey bench, scaled to three quarters of the frame's height or width. */
function lumaOf(picture: GreyPicture): Buffer {
  const scale = Math.min((WIDTH * 0.75) / picture.width, (HEIGHT * 0.75) / picture.height);
  const [width, height] = [Math.round(picture.width * scale), Math.round(picture.height * scale)];
  const [left, top] = [Math.round((WIDTH - width) / 2), Math.round((HEIGHT - height) / 2)];
  const luma = Buffer.alloc(WIDTH * HEIGHT, 200);
  for (let y = 0; y < height; y += 1) {
    for (let x = 0; x < width; x += 1) {
      luma[(top + y) * WIDTH + left + x] = meanOf(picture, x / scale, y / scale, 1 / scale);
    }
  }
  return luma;
}

/** Mean shade of a square of the picture, so that shrinking keeps thin modules. */
function meanOf(picture: GreyPicture, x: number, y: number, side: number): number {
  const [fromX, fromY] = [Math.floor(x), Math.floor(y)];
  const toX = Math.min(picture.width, Math.max(fromX + 1, Math.round(x + side)));
  const toY = Math.min(picture.height, Math.max(fromY + 1, Math.round(y + side)));
  let sum = 0;
  for (let row = fromY; row < toY; row += 1) {
    for (let column = fromX; column < toX; column += 1) sum += picture.pixels[row * picture.width + column] ?? 255;
  }
  return Math.round(sum / ((toX - fromX) * (toY - fromY)));
}
