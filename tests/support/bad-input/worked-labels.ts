import { addLabelStock, saveLabelFit } from '../../../server/services/label-stock-service.ts';
import { notePrint } from '../../../server/services/print-labels.ts';
import { calibrationRules } from '../../../shared/domain/label-fit.ts';
import { sheetOf } from '../label-sheet.ts';
import type { TestFarm } from '../start-farm.ts';
import type { KnownValues } from './sample-request.ts';

/** A label stock, a measured printer and a run of labels; real values by the start of their paths. */
export function givenLabelWork(farm: TestFarm, batchId: string): Record<string, KnownValues> {
  const measures = {
    ...{ paper: 'A4' as const, shape: 'rectangle' as const, width: 40, height: 20, columns: 2, rows: 2 },
    ...{ left: 10, top: 10, pitchX: 50, pitchY: 30, cutLines: false },
  };
  const fit = { stockId: 'a4-65', printer: 'Wet room', ...calibrationRules(sheetOf('a4-65')) };
  const run = { subject: { batchId }, stockId: 'a4-65', start: 1, printer: null, edges: false };
  return farm.write((write) => {
    saveLabelFit(write, fit);
    return {
      '/api/labels/prints': { id: notePrint(write, run, 'http://farm.example.com').id, ...run },
      '/api/label-stocks': {
        ...measures,
        id: addLabelStock(write, { name: 'Own film', ...measures }).id,
        stockId: 'a4-65',
      },
      '/api/label-fits': fit,
    };
  });
}
