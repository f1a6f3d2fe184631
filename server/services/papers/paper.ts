import { createRequire } from 'node:module';
import PDFDocument from 'pdfkit';
import { pdfBytes } from '../pdf-bytes.ts';

export const MARGIN = 56;
export const PAGE = { width: 595.28, height: 841.89 };
export const RIGHT = PAGE.width - MARGIN;
const FOOT = 70;

export interface TextStyle {
  size?: number;
  bold?: boolean;
  soft?: boolean;
  /** Plug codes and numbers of boxes: letters of one width. */
  mono?: boolean;
}

const INK = '#111111';
const SOFT = '#555555';
const { resolve } = createRequire(import.meta.url);
const roboto = (subset: string, weight: number) =>
  resolve(`@fontsource/roboto/files/roboto-${subset}-${weight}-normal.woff`);

/** An A4 page in points, black on white, with text that keeps letters of all European languages in Latin script. */
export class Paper {
  readonly doc: PDFKit.PDFDocument;
  private readonly finished: Promise<Buffer>;
  /** Where the next line goes, from the top. */
  y = MARGIN;

  constructor(title: string) {
    this.doc = new PDFDocument({
      size: 'A4',
      margin: 0,
      bufferPages: true,
      info: { Title: title, Creator: 'Limestead' },
    });
    this.finished = pdfBytes(this.doc);
    for (const [name, weight] of [
      ['plain', 400],
      ['bold', 700],
    ] as const) {
      this.doc.registerFont(name, roboto('latin', weight));
      this.doc.registerFont(`${name}-ext`, roboto('latin-ext', weight));
    }
    this.doc.registerFont('mono', resolve('@fontsource/roboto-mono/files/roboto-mono-latin-500-normal.woff'));
  }

  /** One line of text from `x` on. */
  text(text: string, x: number, y: number, style: TextStyle = {}): void {
    let left = x;
    this.doc.fillColor(style.soft ? SOFT : INK);
    for (const run of runsOf(text)) {
      this.setFont(run, style);
      this.doc.text(run, left, y, { lineBreak: false });
      left += this.doc.widthOfString(run);
    }
  }

  /** One line of text that ends at `x`. */
  textEnd(text: string, x: number, y: number, style: TextStyle = {}): void {
    this.text(text, x - this.widthOf(text, style), y, style);
  }

  /** Lines that break between words to stay within `width`. @returns their height */
  block(text: string, x: number, y: number, width: number, style: TextStyle = {}): number {
    const step = (style.size ?? 10) * 1.4;
    const lines = text.split('\n').flatMap((line) => this.wrap(line, width, style));
    lines.forEach((line, index) => this.text(line, x, y + index * step, style));
    return lines.length * step;
  }

  rule(y: number, weight = 0.5): void {
    this.doc.moveTo(MARGIN, y).lineTo(RIGHT, y).lineWidth(weight).stroke(INK);
  }

  /** Starts a new page where `height` does not fit on this one. @returns whether it did */
  room(height: number): boolean {
    if (this.y + height <= PAGE.height - FOOT) return false;
    this.doc.addPage();
    this.y = MARGIN;
    return true;
  }

  /** Writes the foot of every page and closes the document. */
  finish(foot: string): Promise<Buffer> {
    const { start, count } = this.doc.bufferedPageRange();
    for (let page = 0; page < count; page += 1) {
      this.doc.switchToPage(start + page);
      this.text(foot, MARGIN, PAGE.height - 44, { size: 8.5, soft: true });
      this.textEnd(`${page + 1} / ${count}`, RIGHT, PAGE.height - 44, { size: 8.5, soft: true });
    }
    this.doc.end();
    return this.finished;
  }

  private wrap(line: string, width: number, style: TextStyle): string[] {
    const lines: string[] = [];
    let current = '';
    for (const word of line.split(' ')) {
      const longer = current === '' ? word : `${current} ${word}`;
      if (current !== '' && this.widthOf(longer, style) > width) {
        lines.push(current);
        current = word;
      } else current = longer;
    }
    return [...lines, current];
  }

  private widthOf(text: string, style: TextStyle): number {
    return runsOf(text).reduce((width, run) => {
      this.setFont(run, style);
      return width + this.doc.widthOfString(run);
    }, 0);
  }

  private setFont(run: string, { size = 10, bold = false, mono = false }: TextStyle): void {
    const family = bold ? 'bold' : 'plain';
    this.doc.font(mono ? 'mono' : isExtended(run) ? `${family}-ext` : family).fontSize(size);
  }
}

/** The text cut where letters change between the two files that the typeface comes in. */
function runsOf(text: string): string[] {
  return text.match(/[\u0100-\u02af\u1e00-\u1eff]+|[^\u0100-\u02af\u1e00-\u1eff]+/gu) ?? [];
}

function isExtended(run: string): boolean {
  return /^[\u0100-\u02af\u1e00-\u1eff]/u.test(run);
}
