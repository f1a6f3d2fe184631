import Papa from 'papaparse';
import type { FileAnswer } from '../file-answer.ts';

/** One column of an export: its head and the value of a row. */
export type CsvColumns<Row> = Readonly<Record<string, (row: Row) => string | number | null>>;

/**
 * A table as a CSV download with a head line. Text that a spreadsheet would run as a formula is defused; the byte order
 * mark makes spreadsheets read UTF-8.
 */
export function csvFile<Row>(fileName: string, columns: CsvColumns<Row>, rows: readonly Row[]): FileAnswer {
  const heads = Object.keys(columns);
  const cells = Object.values(columns);
  const content = Papa.unparse(
    { fields: heads, data: rows.map((row) => cells.map((cell) => cell(row) ?? '')) },
    { escapeFormulae: true },
  );
  return { fileName, contentType: 'text/csv; charset=utf-8', content: `\uFEFF${content}\r\n` };
}
