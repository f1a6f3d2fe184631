import { expect, it } from 'vitest';
import { shipOrder } from '../../../server/services/ship-order.ts';
import {
  fakePayments,
  givenLaterBatch,
  givenOffer,
  givenPacked,
  givenPaidOrder,
  givenPicked,
} from '../../support/given-orders.ts';
import { startFarm } from '../../support/start-farm.ts';

it('when a promise is written onto another batch, the database refuses', async () => {
  const farm = await startFarm({ payments: fakePayments() });
  const offer = givenOffer(farm, { pieces: 5 });
  const later = givenLaterBatch(farm, offer, { pieces: 1 });
  await givenPaidOrder(farm, [{ offer, quantity: 4 }]);

  expect(() => farm.deps.sqlite.exec(`UPDATE hold SET batch_id = '${later.batchId}'`)).toThrow(
    'A promise stays on its batch.',
  );
  expect(() => farm.deps.sqlite.exec('UPDATE hold SET pieces = 6')).toThrow('order.not_available');
});

it.each(['id', 'number', 'order_id'])(
  'when an invoice is written over by its %s, the database refuses',
  async (column) => {
    const farm = await startFarm({ payments: fakePayments() });
    const offer = givenOffer(farm, { pieces: 2 });
    const order = await givenPaidOrder(farm, [{ offer, quantity: 1 }]);
    givenPicked(farm, order.id, offer.codes.slice(0, 1));
    givenPacked(farm, order.id);
    farm.write((write) => shipOrder(write, order.id, { carrier: 'Night van', tracking: '' }));
    const other = { id: `'other'`, number: '99', order_id: 'order_id', [column]: column };

    const replace = `INSERT OR REPLACE INTO invoice (id, number, order_id, issued_on, content, created_at)
      SELECT ${other.id}, ${other.number}, ${other.order_id}, issued_on, '{}', 1 FROM invoice`;
    expect(() => farm.deps.sqlite.exec(replace)).toThrow('Invoices are never changed.');
  },
);
