import type { CostOverview, COST_TABLES, LineCost, SystemMonth } from '../../shared/contracts/costs.ts';
import { MICRO_PER_MAJOR } from '../../shared/domain/money.ts';
import type { FileAnswer } from '../file-answer.ts';
import { csvFile, type CsvColumns } from '../http/csv-file.ts';

/** A table of costs as CSV, in the farm's currency. */
export function costCsv(table: (typeof COST_TABLES)[number], costs: CostOverview, currency: string): FileAnswer {
  return table === 'lines'
    ? csvFile('cost-by-line.csv', lineColumns(currency), costs.lines)
    : csvFile('cost-by-system-and-month.csv', monthColumns(currency), costs.months);
}

function lineColumns(currency: string): CsvColumns<LineCost> {
  return {
    line: (line) => line.code,
    trade_name: (line) => line.tradeName,
    batches: (line) => line.batches,
    living: (line) => line.living,
    [`total_${currency}`]: (line) => major(line.totalMicro),
    [`per_living_frag_${currency}`]: (line) => major(line.perLivingMicro),
    [`lime_per_living_frag_${currency}`]: (line) => major(line.limePerLivingMicro),
    [`vinegar_per_living_frag_${currency}`]: (line) => major(line.vinegarPerLivingMicro),
    [`plugs_and_glue_per_living_frag_${currency}`]: (line) => major(line.cutPerLivingMicro),
    [`other_per_living_frag_${currency}`]: (line) => major(line.otherPerLivingMicro),
  };
}

function monthColumns(currency: string): CsvColumns<SystemMonth> {
  return {
    month: (row) => row.month,
    system: (row) => row.systemCode,
    frag_days: (row) => row.fragDays,
    [`lime_${currency}`]: (row) => major(row.limeMicro),
    [`vinegar_${currency}`]: (row) => major(row.vinegarMicro),
    [`other_${currency}`]: (row) => major(row.otherMicro),
    [`total_${currency}`]: (row) => major(row.totalMicro),
    [`not_shared_${currency}`]: (row) => major(row.unsharedMicro),
  };
}

function major(micro: number | null): number | null {
  return micro === null ? null : micro / MICRO_PER_MAJOR;
}
