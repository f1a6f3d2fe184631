import type { ImportMapping, ImportProblem } from '../../../shared/contracts/reading-imports.ts';
import { numberFromText } from '../../../shared/domain/number-text.ts';
import { readingValue } from '../../../shared/domain/reading-value.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../../shared/domain/units.ts';
import type { CsvTable } from './csv-table.ts';
import { readTime } from './read-time.ts';

/** A value of a file that could become a reading. */
export interface ImportValue {
  line: number;
  systemId: string;
  systemCode: string;
  takenAt: number;
  parameter: ParameterCode;
  value: number;
  method: string;
  note: string;
}

export interface ImportRow {
  line: number;
  values: ImportValue[];
  problems: ImportProblem[];
}

export interface ImportContext {
  mapping: ImportMapping;
  timeZone: string;
  /** Readings after it are still to come. */
  latest: number;
  systemByName: (name: string) => { id: string; code: string } | undefined;
  systemById: (id: string) => { id: string; code: string } | undefined;
}

/** Reads the rows of a file by what their columns mean. A row with any problem brings nothing. */
export function readRows(table: CsvTable, context: ImportContext): ImportRow[] {
  return table.rows.map((row) => new RowReader(table.heads, row, context).read());
}

class RowReader {
  private readonly problems: ImportProblem[] = [];

  constructor(
    private readonly heads: readonly string[],
    private readonly row: CsvTable['rows'][number],
    private readonly context: ImportContext,
  ) {}

  read(): ImportRow {
    const { line } = this.row;
    const takenAt = this.takenAt();
    const system = this.system();
    const measured = this.measured();
    if (measured.length === 0 && this.problems.length === 0) this.problem('', 'No value stands in this row.');
    const { problems } = this;
    if (problems.length > 0 || takenAt === null || !system) return { line, values: [], problems };
    const texts = { method: this.text('method').slice(0, 80), note: this.text('note').slice(0, 2000) };
    const shared = { line, systemId: system.id, systemCode: system.code, takenAt, ...texts };
    return { line, values: measured.map((each) => ({ ...shared, ...each })), problems };
  }

  private takenAt(): number | null {
    const { mapping, timeZone, latest } = this.context;
    const written = this.text('taken') || `${this.text('day')} ${this.text('time')}`.trim();
    const takenAt = readTime(written, mapping.dateOrder, timeZone);
    if (takenAt === null) {
      this.problem(
        '',
        written === '' ? 'There is no day.' : `“${written.slice(0, 40)}” is no day and time that can be read.`,
      );
    } else if (takenAt > latest) {
      this.problem('', 'This time is still to come. Check how days are written.');
    }
    return takenAt;
  }

  private system(): { id: string; code: string } | undefined {
    const { mapping, systemById, systemByName } = this.context;
    const name = this.text('system');
    const system = name === '' ? systemById(mapping.systemId ?? '') : systemByName(name);
    if (!system) {
      this.problem(
        '',
        name === '' ? 'Choose the system of these readings.' : `There is no system “${name.slice(0, 40)}”.`,
      );
    }
    return system;
  }

  private measured(): { parameter: ParameterCode; value: number }[] {
    return this.context.mapping.columns.flatMap(({ role, unit }, index) => {
      const parameter = PARAMETER_CODES.find((code) => code === role);
      const cell = this.row.cells[index] ?? '';
      if (!parameter || cell === '') return [];
      const typed = numberFromText(cell);
      const read =
        typed === null ? { problem: `“${cell.slice(0, 40)}” is no number.` } : readingValue(parameter, typed, unit);
      if (read.problem === null) return [{ parameter, value: read.value }];
      this.problem(this.heads[index] ?? '', read.problem);
      return [];
    });
  }

  private text(role: string): string {
    const index = this.context.mapping.columns.findIndex((column) => column.role === role);
    return index === -1 ? '' : (this.row.cells[index] ?? '');
  }

  private problem(column: string, message: string): void {
    this.problems.push({ line: this.row.line, column, message });
  }
}
