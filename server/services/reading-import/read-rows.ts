import type { ColumnRole, ImportMapping, ImportProblem } from '../../../shared/contracts/reading-imports.ts';
import { numberFromFile } from '../../../shared/domain/number-text.ts';
import { canonicalValue } from '../../../shared/domain/reading-value.ts';
import { suspectValue } from '../../../shared/domain/suspect-value.ts';
import { PARAMETER_CODES, type ParameterCode } from '../../../shared/domain/units.ts';
import type { CsvTable } from './csv-table.ts';
import { readTime } from './read-time.ts';
import { parameterNamed, unitNamed } from './words.ts';
import type { ZoneClock } from './zone-clock.ts';

/** A value of a file that could become a reading. */
export interface ImportValue {
  line: number;
  systemId: string;
  systemCode: string;
  takenAt: number;
  parameter: ParameterCode;
  /** As measured, canonical. */
  value: number;
  unit: string;
  method: string;
  kitLot: string;
  /** Empty: the one who imports. */
  tester: string;
  note: string;
}

export interface ImportRow {
  line: number;
  values: ImportValue[];
  problems: ImportProblem[];
  /** The clocks showed its time twice; the first was taken. */
  isTwice: boolean;
}

export interface ImportContext {
  mapping: ImportMapping;
  clock: ZoneClock;
  /** Readings after it are still to come. */
  latest: number;
  systemByName: (name: string) => { id: string; code: string } | undefined;
  systemById: (id: string) => { id: string; code: string } | undefined;
}

/** Reads a row of a file by what its columns mean. A row with any problem brings nothing. */
export function readRow(heads: readonly string[], row: CsvTable['rows'][number], context: ImportContext): ImportRow {
  return new RowReader(heads, row, context).read();
}

class RowReader {
  private readonly problems: ImportProblem[] = [];
  private readonly heads: readonly string[];
  private readonly row: CsvTable['rows'][number];
  private readonly context: ImportContext;
  private isTwice = false;

  constructor(heads: readonly string[], row: CsvTable['rows'][number], context: ImportContext) {
    this.heads = heads;
    this.row = row;
    this.context = context;
  }

  read(): ImportRow {
    const { line } = this.row;
    const takenAt = this.takenAt();
    const system = this.system();
    const measured = this.measured();
    if (measured.length === 0 && this.problems.length === 0) this.problem('', 'No value stands in this row.');
    const { problems, isTwice } = this;
    if (problems.length > 0 || takenAt === null || !system) return { line, values: [], problems, isTwice };
    const texts = {
      ...{ method: this.text('method').slice(0, 80), kitLot: this.text('lot').slice(0, 40) },
      ...{ tester: this.text('tester').slice(0, 120), note: withoutGuard(this.text('note')).slice(0, 2000) },
    };
    const shared = { line, systemId: system.id, systemCode: system.code, takenAt, ...texts };
    return { line, values: measured.map((each) => ({ ...shared, ...each })), problems, isTwice };
  }

  private takenAt(): number | null {
    const { mapping, clock, latest } = this.context;
    const written = this.text('taken') || `${this.text('day')} ${this.text('time')}`.trim();
    const time = readTime(written, mapping.dateOrder, clock);
    const shown = `“${written.slice(0, 40)}”`;
    if (time === null) {
      this.problem('', written === '' ? 'There is no day.' : `${shown} is no day and time that can be read.`);
    } else if (time.jump === 'skipped') {
      this.problem(
        '',
        `${shown} never was in ${clock.timeZone}: the clocks went forward. Choose the file’s time zone.`,
      );
    } else if (time.at > latest) {
      this.problem('', 'This time is still to come. Check how days are written.');
    }
    this.isTwice = time?.jump === 'twice';
    return time?.at ?? null;
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

  private measured(): { parameter: ParameterCode; value: number; unit: string }[] {
    return this.context.mapping.columns.flatMap(({ role, unit }, index) => {
      const cell = this.row.cells[index] ?? '';
      if (cell === '') return [];
      const head = this.heads[index] ?? '';
      if (role === 'value') return this.namedValue(cell, head);
      const parameter = PARAMETER_CODES.find((code) => code === role);
      return parameter ? this.valueOf(parameter, cell, unit, head) : [];
    });
  }

  /** The value of a row that says itself what it is of, and in which unit. */
  private namedValue(cell: string, head: string) {
    const [name, written] = [this.text('parameter'), this.text('unit')];
    const parameter = parameterNamed(name);
    if (!parameter) {
      this.problem(this.headOf('parameter'), `“${name.slice(0, 40)}” is no parameter that is kept here.`);
      return [];
    }
    const unit = written === '' ? '' : unitNamed(parameter, written);
    if (unit === null) {
      this.problem(this.headOf('unit'), `“${written.slice(0, 40)}” is no unit of this parameter.`);
      return [];
    }
    return this.valueOf(parameter, cell, unit, head);
  }

  private valueOf(parameter: ParameterCode, cell: string, unit: string, head: string) {
    const typed = numberFromFile(cell, this.context.mapping.decimalMark);
    if (typed === null) {
      this.problem(head, `“${cell.slice(0, 40)}” is no number.`);
      return [];
    }
    // A file is not asked line by line: what is merely unusual is taken, what can't be is left out.
    const suspicion = suspectValue(parameter, typed, unit, null);
    const value = canonicalValue(parameter, typed, unit);
    if (suspicion?.kind === 'impossible' || value === null) {
      this.problem(head, suspicion?.message ?? 'Check this value.');
      return [];
    }
    return [{ parameter, value, unit }];
  }

  private text(role: ColumnRole): string {
    const index = this.context.mapping.columns.findIndex((column) => column.role === role);
    return index === -1 ? '' : (this.row.cells[index] ?? '');
  }

  private headOf(role: ColumnRole): string {
    return this.heads[this.context.mapping.columns.findIndex((column) => column.role === role)] ?? '';
  }

  private problem(column: string, message: string): void {
    this.problems.push({ line: this.row.line, column, message });
  }
}

/** Our own exports put a mark before text that a spreadsheet would run; it comes off again. */
function withoutGuard(text: string): string {
  return text.replace(/^'(?=[=+\-@\t\r])/, '');
}
