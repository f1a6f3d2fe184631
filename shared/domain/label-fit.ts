import { DomainError } from '../errors.ts';
import { pageOf } from './label-places.ts';
import type { LabelMeasures } from './label-sheets.ts';

/** How a printer is made to hit the labels: what belongs at x is drawn at x · scale + shift, mm from the top left. */
export interface LabelFit {
  shiftX: number;
  shiftY: number;
  scaleX: number;
  scaleY: number;
}

/** Nothing is shifted or stretched. */
export const NO_FIT: LabelFit = { shiftX: 0, shiftY: 0, scaleX: 1, scaleY: 1 };

/** The two rules of a calibration page, mm: how far they start from the left and the top edge, and how long they are. */
interface CalibrationRules {
  left: number;
  top: number;
  across: number;
  down: number;
}

const LONGEST_RULE = 150;
/** Clear of the strip at the edge that most printers cannot reach (common practice, no source). */
const SHEET_START = 20;
const ROLL_START = 3;
/** A printer further off than this was told to fit the page, or took another paper. */
const MOST_SCALE = 0.05;
const MOST_SHIFT = 15;

/** Where the rules of a stock's calibration page lie: as long as its page allows. */
export function calibrationRules(sheet: LabelMeasures): CalibrationRules {
  const page = pageOf(sheet);
  const start = sheet.paper === 'roll' ? ROLL_START : SHEET_START;
  const length = (side: number) => Math.min(LONGEST_RULE, Math.floor(side - 2 * start));
  return { left: start, top: start, across: length(page.width), down: length(page.height) };
}

/**
 * The fit that cancels what a printer does, from what was measured on its calibration page. A printer puts what is drawn
 * at x to a + b · x; the rules give a and b on both axes.
 *
 * @param rules what was drawn
 * @param measured the same four lengths on the paper, mm
 * @throws {DomainError} `input.invalid` where the printer stretches by more than 5 % or shifts by more than 15 mm
 */
export function fitFromMeasures(rules: CalibrationRules, measured: CalibrationRules): LabelFit {
  const stretchX = measured.across / rules.across;
  const stretchY = measured.down / rules.down;
  assertWithin('across', Math.abs(stretchX - 1), MOST_SCALE, STRETCHED);
  assertWithin('down', Math.abs(stretchY - 1), MOST_SCALE, STRETCHED);
  const offX = measured.left - rules.left * stretchX;
  const offY = measured.top - rules.top * stretchY;
  assertWithin('left', Math.abs(offX), MOST_SHIFT, SHIFTED);
  assertWithin('top', Math.abs(offY), MOST_SHIFT, SHIFTED);
  return { shiftX: -offX / stretchX, shiftY: -offY / stretchY, scaleX: 1 / stretchX, scaleY: 1 / stretchY };
}

const STRETCHED = 'More than 5 % off. Print at 100 %, without fitting to the page, and measure again.';
const SHIFTED = 'More than 15 mm off. Check the paper size in the printer and measure again.';

function assertWithin(path: string, off: number, most: number, message: string): void {
  if (off <= most) return;
  throw new DomainError('input.invalid', message, { fields: [{ path, message }] });
}
