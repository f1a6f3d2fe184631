import { Readable } from 'node:stream';
import Papa from 'papaparse';
import { IMPORT_MAX_COLUMNS, IMPORT_MAX_ROWS } from '../../../shared/contracts/reading-imports.ts';
import { DomainError } from '../../../shared/errors.ts';
import { breathe } from './breathe.ts';

/** A file as rows of cells; `line` counts as a spreadsheet does, the head being line 1. */
export interface CsvTable {
  heads: string[];
  rows: { line: number; cells: string[] }[];
}

/** Characters that are read without a pause: some 10 ms of work. */
const PIECE = 100_000;

/**
 * Reads a CSV file: UTF-8, any usual separator, a head line.
 *
 * @throws {DomainError} `input.invalid` at the file for what is no table, or too large a one
 */
export function readCsvTable(content: Buffer): CsvTable {
  const maker = new TableMaker();
  maker.take(Papa.parse<string[]>(textOf(content), { header: false, skipEmptyLines: false }).data);
  return maker.table();
}

/** The same in pieces, so that a large file holds up nobody else. */
export function readCsvTableInPieces(content: Buffer): Promise<CsvTable> {
  const maker = new TableMaker();
  const stream = Readable.from(piecesOf(textOf(content)));
  return new Promise<void>((resolve, reject) => {
    Papa.parse<string[], Readable>(stream, {
      ...{ header: false, skipEmptyLines: false, error: reject },
      chunk: ({ data }) => {
        maker.take(data);
      },
      complete: () => {
        resolve();
      },
    });
  }).then(() => maker.table());
}

async function* piecesOf(text: string): AsyncGenerator<string> {
  for (let start = 0; start < text.length; start += PIECE) {
    yield text.slice(start, start + PIECE);
    await breathe();
  }
}

class TableMaker {
  private heads: string[] | null = null;
  private readonly rows: CsvTable['rows'] = [];
  private line = 0;

  take(lines: readonly string[][]): void {
    for (const raw of lines) {
      this.line += 1;
      const cells = raw.map((cell) => cell.trim());
      if (!cells.some((cell) => cell !== '')) continue;
      if (this.heads) this.rows.push({ line: this.line, cells });
      else this.heads = cells;
    }
  }

  table(): CsvTable {
    const { heads, rows } = this;
    if (!heads || rows.length === 0) throw refused('The file needs a head line and at least one row below it.');
    if (heads.length > IMPORT_MAX_COLUMNS) throw refused(`Use at most ${IMPORT_MAX_COLUMNS} columns.`);
    if (rows.length > IMPORT_MAX_ROWS) {
      throw refused(`The file has ${rows.length} rows; ${IMPORT_MAX_ROWS} at once is the limit. Split it.`);
    }
    return { heads, rows };
  }
}

function textOf(content: Buffer): string {
  // A zero byte never stands in text: a spreadsheet file or UTF-16 was chosen.
  if (content.includes(0)) throw refused('This is not a plain CSV file. Save the table as CSV (UTF-8) first.');
  return new TextDecoder('utf-8').decode(content);
}

function refused(message: string): DomainError {
  return new DomainError('input.invalid', message, { fields: [{ path: 'file', message }] });
}
