import { LABEL_SHEETS, type LabelSheet } from '../../shared/domain/label-sheets.ts';

/** A label stock of the product by its id. */
export function sheetOf(id: string): LabelSheet {
  const sheet = LABEL_SHEETS.find((each) => each.id === id);
  if (!sheet) throw new Error(`There is no label stock ${id}.`);
  return sheet;
}
