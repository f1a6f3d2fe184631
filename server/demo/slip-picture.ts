import { crc32, deflateSync } from 'node:zlib';
import type { Chance } from './chance.ts';

const [WIDTH, HEIGHT, LINE] = [240, 160, 26];
const [PAPER, RULE, INK] = [248, 214, 60];

/** A small picture of a ruled paper with some handwriting on it, as PNG (ISO/IEC 15948), in shades of grey. */
export function slipPicture(chance: Chance): Buffer {
  const shades = Buffer.alloc(WIDTH * HEIGHT, PAPER);
  for (let y = LINE; y < HEIGHT; y += LINE) {
    shades.fill(RULE, y * WIDTH, (y + 1) * WIDTH);
    write(shades, y - 5, chance);
  }
  const rows = Array.from({ length: HEIGHT }, (_, y) => [
    Buffer.from([0]),
    shades.subarray(y * WIDTH, (y + 1) * WIDTH),
  ]);
  const header = Buffer.alloc(13);
  header.writeUInt32BE(WIDTH, 0);
  header.writeUInt32BE(HEIGHT, 4);
  header.set([8, 0, 0, 0, 0], 8);
  return Buffer.concat([
    Buffer.from('89504e470d0a1a0a', 'hex'),
    chunk('IHDR', header),
    chunk('IDAT', deflateSync(Buffer.concat(rows.flat()))),
    chunk('IEND', Buffer.alloc(0)),
  ]);
}

/** A few words as waves on a line. */
function write(shades: Buffer, base: number, chance: Chance): void {
  let x = 16 + chance.int(12);
  for (let word = 0; word < 3; word += 1) {
    const [end, high, pace] = [x + 24 + chance.int(30), chance.between(3, 6), chance.between(0.5, 0.9)];
    for (; x < end && x < WIDTH - 12; x += 1) {
      const y = Math.round(base - high - high * Math.sin(x * pace));
      for (const thick of [0, 1]) shades[(y + thick) * WIDTH + x] = INK;
    }
    x += 12;
  }
}

function chunk(type: string, content: Buffer): Buffer {
  const body = Buffer.concat([Buffer.from(type, 'latin1'), content]);
  const frame = Buffer.alloc(8);
  frame.writeUInt32BE(content.length, 0);
  frame.writeUInt32BE(crc32(body), 4);
  return Buffer.concat([frame.subarray(0, 4), body, frame.subarray(4)]);
}
