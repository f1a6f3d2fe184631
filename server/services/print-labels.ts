import type { LabelPrint, PrintLabels } from '../../shared/contracts/labels.ts';
import { placesFor } from '../../shared/domain/label-places.ts';
import { labelPrints } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import { printedContents, toLabelPrint } from '../queries/label-prints.ts';
import { labelStock } from '../queries/label-stocks.ts';

/**
 * Notes a run of labels, so that its PDF can be made now and again later.
 *
 * @param origin address of the farm's pages, which the QR codes lead to
 * @throws {DomainError} `record.not_found`; `input.invalid` for a start that the sheet has not
 */
export function notePrint(write: Write, input: PrintLabels, origin: string): LabelPrint {
  const { title, labels } = printedContents(write.tx, input.subject, origin);
  placesFor(labelStock(write.tx, input.stockId), labels.length, input.start);
  const row = write.tx
    .insert(labelPrints)
    .values({
      ...{ id: write.newId(), ...input, printer: input.printer ?? '', title, labels: labels.length },
      ...{ at: write.now, by: write.actor.name },
    })
    .returning()
    .get();
  write.audit({ action: 'labels.printed', entity: 'label_print', entityId: row.id, after: row });
  return toLabelPrint(write.tx, row);
}
