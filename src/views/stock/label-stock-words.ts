import { labelsOn, pageOf } from '@shared/domain/label-places.ts';
import { type LabelMeasures, PAPERS } from '@shared/domain/label-sheets.ts';
import { formatNumber } from '@/formatting/format-number.ts';
import { plural } from '@/formatting/plural.ts';

const mm = (length: number) => formatNumber(length, { decimals: 1 });

/** The measures of a label stock in a line. */
export function stockWords(stock: LabelMeasures): string {
  const size = stock.shape === 'round' ? `⌀ ${mm(stock.width)} mm` : `${mm(stock.width)} × ${mm(stock.height)} mm`;
  if (stock.paper === 'roll') return `Roll of ${size}, one label a page`;
  const count = plural(labelsOn(stock), 'label');
  return `${PAPERS[stock.paper].name}, ${count} of ${size}, pitch ${mm(stock.pitchX)} × ${mm(stock.pitchY)} mm, margins ${mm(stock.left)} and ${mm(stock.top)} mm`;
}

/** A label to look at while a stock is measured out; its code is a right one that nobody has. */
export const SAMPLE_LABEL = {
  qrText: `${window.location.origin}/P/B00017J`.toUpperCase(),
  code: 'B00-017J',
  glyphCode: 'WIG',
  rows: ['WIG 12', 'cut 2026-03-02', 'WIG-2610-1'],
};

/** What is left beside and below the labels, mm: worth a look before a sheet is bought by the box. */
export function roomLeft(stock: LabelMeasures): { right: number; bottom: number } {
  const page = pageOf(stock);
  return {
    right: page.width - stock.left - (stock.columns - 1) * stock.pitchX - stock.width,
    bottom: page.height - stock.top - (stock.rows - 1) * stock.pitchY - stock.height,
  };
}
