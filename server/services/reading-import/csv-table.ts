import Papa from 'papaparse';
import { IMPORT_MAX_COLUMNS, IMPORT_MAX_ROWS } from '../../../shared/contracts/reading-imports.ts';
import { DomainError } from '../../../shared/errors.ts';

/** A file as rows of cells; `line` counts as a spreadsheet does, the head being line 1. */
export interface CsvTable {
  heads: string[];
  rows: { line: number; cells: string[] }[];
}

/**
 * Reads a CSV file: UTF-8, any usual separator, a head line.
 *
 * @throws {DomainError} `input.invalid` at the file for what is no table, or too large a one
 */
export function readCsvTable(content: Buffer): CsvTable {
  const parsed = Papa.parse<string[]>(textOf(content), { header: false, skipEmptyLines: false });
  const lines = parsed.data
    .map((cells, index) => ({ line: index + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''));
  const [head, ...rows] = lines;
  if (!head || rows.length === 0) throw refused('The file needs a head line and at least one row below it.');
  if (head.cells.length > IMPORT_MAX_COLUMNS) throw refused(`Use at most ${IMPORT_MAX_COLUMNS} columns.`);
  if (rows.length > IMPORT_MAX_ROWS) {
    throw refused(`The file has ${rows.length} rows; ${IMPORT_MAX_ROWS} at once is the limit. Split it.`);
  }
  return { heads: head.cells, rows };
}

function textOf(content: Buffer): string {
  // A zero byte never stands in text: a spreadsheet file or UTF-16 was chosen.
  if (content.includes(0)) throw refused('This is not a plain CSV file. Save the table as CSV (UTF-8) first.');
  return new TextDecoder('utf-8').decode(content);
}

function refused(message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path: 'file', message }] });
}
