import type { LabelMeasures } from './label-sheets.ts';

/** What one label says. */
export interface LabelContent {
  /** What the QR code holds. */
  qrText: string;
  /** The code as people read it. */
  code: string;
  /** Code of the line whose glyph is drawn; null where there is none. */
  glyphCode: string | null;
  /** Further words, most useful first; those that do not fit are left out. */
  rows: readonly string[];
}

/** Where the parts of a label lie, mm from its own top left corner. Texts are set in the mono type of the labels. */
export interface LabelLayout {
  /** Side with the quiet zone; the code itself starts `quiet` further in. */
  qr: { x: number; y: number; side: number; quiet: number; module: number };
  glyph: { x: number; y: number; side: number } | null;
  /** `y` is the baseline; `anchor` says which end of the text `x` is. */
  texts: { text: string; x: number; y: number; size: number; anchor: 'start' | 'middle' }[];
}

/** Light modules on each side that ISO/IEC 18004 asks for. */
const QUIET_MODULES = 4;
/** Width of a character and height of a capital in the mono type, as parts of its size. */
const MONO_ADVANCE = 0.6;
const CAP_HEIGHT = 0.72;
const ROW_HEIGHT = 1.12;
/** Larger squares read no better at arm's length and leave less room for words. */
const LARGEST_MODULE = 0.5;
const EDGE = 0.4;
const RIGHT_EDGE = 1;
/** The label whose words have the sizes below; larger labels have larger words. */
const SMALL_LABEL = 12.7;
const SMALL_CODE = 1.9;
const SMALL_ROUND_CODE = 1.3;
const LARGEST_STACKED_CODE = 3;
const LARGEST_CODE = 4;
/** Smaller words are not read on a rack, mm. */
const SMALLEST_ROW = 1.6;
/** Between the quiet zone and the words in the arcs of a round label. */
const ARC_GAP = 0.25;

/**
 * Lays out one label: the QR code as large as its label allows, then the code in letters, then what else fits.
 *
 * @param modules side of the QR code in modules, without its quiet zone
 */
export function layoutLabel(
  sheet: Pick<LabelMeasures, 'shape' | 'width' | 'height'>,
  content: LabelContent,
  modules: number,
): LabelLayout {
  if (sheet.shape === 'round') return roundLayout(sheet.width, content, modules);
  const side = wideQrSide(sheet.height, modules);
  const roomForCode = sheet.width - EDGE - side - RIGHT_EDGE;
  return roomForCode >= monoWidth(content.code, SMALLEST_ROW)
    ? wideLayout(sheet, content, modules)
    : stackedLayout(sheet, content, modules);
}

/** Width of a text in the labels' mono type, mm. */
export function monoWidth(text: string, size: number): number {
  return text.length * MONO_ADVANCE * size;
}

function wideLayout({ width, height }: { width: number; height: number }, content: LabelContent, modules: number) {
  const side = wideQrSide(height, modules);
  const qr = qrBox(EDGE, (height - side) / 2, side, modules);
  // The quiet zone is all the space that the words need on their left.
  const left = qr.x + side;
  const room = { width: width - left - RIGHT_EDGE, height: height - 2 * EDGE };

  const codeSize = Math.min(LARGEST_CODE, sizeToFit(content.code, room.width), room.height / 3);
  const rowSize = Math.min(codeSize * 0.78, 2.6);
  const rowHeight = rowSize * ROW_HEIGHT;
  const rowsThatFit = Math.max(0, Math.floor((room.height - codeSize * ROW_HEIGHT) / rowHeight + 0.05));
  const glyphSide = content.glyphCode === null ? 0 : rowSize * 1.3;
  const rows = content.rows
    .map((text, index) => {
      const indent = index === 0 && glyphSide > 0 ? glyphSide + 0.6 : 0;
      return { text, indent, size: Math.min(rowSize, sizeToFit(text, room.width - indent)) };
    })
    .filter(({ size }) => size >= SMALLEST_ROW)
    .slice(0, rowsThatFit);

  const blockHeight = codeSize * ROW_HEIGHT + rows.length * rowHeight;
  const top = (height - blockHeight) / 2;
  const baselineOf = (index: number) => top + codeSize * ROW_HEIGHT + index * rowHeight + rowSize * 0.92;
  return {
    qr,
    glyph:
      rows.length > 0 && glyphSide > 0
        ? { x: left, y: baselineOf(0) - rowSize * (CAP_HEIGHT / 2) - glyphSide / 2, side: glyphSide }
        : null,
    texts: [
      { text: content.code, x: left, y: top + codeSize * 0.86, size: codeSize, anchor: 'start' as const },
      ...rows.map(({ text, indent, size }, index) => {
        return { text, x: left + indent, y: baselineOf(index), size, anchor: 'start' as const };
      }),
    ],
  };
}

/** For labels too narrow for words beside the QR code: the code and what else fits stand below it. */
function stackedLayout({ width, height }: { width: number; height: number }, content: LabelContent, modules: number) {
  const room = width - 2 * EDGE;
  const growth = Math.max(1, Math.min(width, height) / SMALL_LABEL);
  const codeSize = Math.min(LARGEST_STACKED_CODE, SMALL_CODE * growth, sizeToFit(content.code, room));
  const largest = (modules + 2 * QUIET_MODULES) * LARGEST_MODULE;
  const side = Math.min(width, height - EDGE - codeSize, largest);
  const rowSize = Math.max(SMALLEST_ROW, codeSize * 0.7);
  const rowsThatFit = Math.floor((height - EDGE - codeSize - side) / (rowSize * ROW_HEIGHT));
  const rows = content.rows.filter((text) => sizeToFit(text, room) >= SMALLEST_ROW).slice(0, Math.max(0, rowsThatFit));

  const top = (height - side - codeSize - rows.length * rowSize * ROW_HEIGHT - EDGE) / 2;
  const codeBaseline = top + side + codeSize * 0.9;
  return {
    qr: qrBox((width - side) / 2, top, side, modules),
    glyph: null,
    texts: [
      { text: content.code, x: width / 2, y: codeBaseline, size: codeSize, anchor: 'middle' as const },
      ...rows.map((text, index) => ({
        ...{ text, x: width / 2, y: codeBaseline + (index + 1) * rowSize * ROW_HEIGHT },
        ...{ size: Math.min(rowSize, sizeToFit(text, room)), anchor: 'middle' as const },
      })),
    ],
  };
}

/** The QR code with its quiet zone fills the square inside the circle; words sit in the arcs above and below. */
function roundLayout(width: number, content: LabelContent, modules: number): LabelLayout {
  const side = Math.min(width / Math.SQRT2 - 0.1, (modules + 2 * QUIET_MODULES) * LARGEST_MODULE);
  const inset = (width - side) / 2;
  const size = Math.min(LARGEST_STACKED_CODE, (SMALL_ROUND_CODE * width) / SMALL_LABEL);
  // Clear of the cut by a little on both sides.
  const room = arcWidth(width, inset - ARC_GAP - size * CAP_HEIGHT) - 2 * EDGE;
  const above = content.glyphCode !== null && monoWidth(content.glyphCode, size) <= room ? [content.glyphCode] : [];
  const below = Math.min(size, sizeToFit(content.code, room));
  return {
    qr: qrBox(inset, inset, side, modules),
    glyph: null,
    texts: [
      ...above.map((text) => ({ text, x: width / 2, y: inset - ARC_GAP, size, anchor: 'middle' as const })),
      {
        ...{ text: content.code, x: width / 2, y: width - inset + ARC_GAP + below * CAP_HEIGHT },
        ...{ size: below, anchor: 'middle' as const },
      },
    ],
  };
}

function wideQrSide(height: number, modules: number): number {
  return Math.min(height - 2 * EDGE, (modules + 2 * QUIET_MODULES) * LARGEST_MODULE);
}

function qrBox(x: number, y: number, side: number, modules: number): LabelLayout['qr'] {
  const module = side / (modules + 2 * QUIET_MODULES);
  return { x, y, side, quiet: QUIET_MODULES * module, module };
}

function sizeToFit(text: string, width: number): number {
  return width / (text.length * MONO_ADVANCE);
}

/** Width of a circle at a distance from its edge. */
function arcWidth(diameter: number, fromEdge: number): number {
  return 2 * Math.sqrt(Math.max(0, fromEdge * (diameter - fromEdge)));
}
