import fc from 'fast-check';
import { sql } from 'drizzle-orm';
import { describe, expect, it } from 'vitest';
import { orders, picks, plugs } from '../../../server/db/schema/index.ts';
import { cancelOrder, expireOrder } from '../../../server/services/cancel-order.ts';
import { confirmPayment } from '../../../server/services/confirm-payment.ts';
import { packOrder } from '../../../server/services/pack-order.ts';
import { pickPlug, undoPick } from '../../../server/services/pick-service.ts';
import { shipOrder } from '../../../server/services/ship-order.ts';
import { DomainError } from '../../../shared/errors.ts';
import { givenLaterBatch, givenOffer, givenOrder } from '../../support/given-orders.ts';
import { givenLoss } from '../../support/given-stock.ts';
import { startFarm } from '../../support/start-farm.ts';

const CUT = 9;

const step = fc.record({
  act: fc.constantFrom(
    'place',
    'place',
    'pay',
    'pay',
    'pick',
    'pick',
    'pick',
    'undo',
    'cancel',
    'expire',
    'loss',
    'pack',
    'ship',
  ),
  order: fc.nat(7),
  plug: fc.nat(CUT - 1),
  quantity: fc.integer({ min: 1, max: 5 }),
  store: fc.nat(1),
});

interface BatchCount {
  id: string;
  cut: number;
  onRacks: number;
  held: number;
  picked: number;
  sold: number;
  lost: number;
}

describe('whatever is done in whatever order', () => {
  it('no piece is promised twice, sold twice or sold without having been cut', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(step, { minLength: 5, maxLength: 40 }), async (steps) => {
        const farm = await startFarm();
        const offer = givenOffer(farm, { pieces: 5 });
        const later = givenLaterBatch(farm, offer, { pieces: 4 });
        const codes = [...offer.codes, ...later.plugs.map(({ code }) => code)];
        const made: string[] = [];
        let lossCame = false;

        for (const each of steps) {
          const orderId = made[each.order % Math.max(1, made.length)] ?? '';
          const code = codes[each.plug] ?? '';
          const acts: Record<typeof each.act, () => unknown> = {
            place: () =>
              made.push(givenOrder(farm, [{ offer, quantity: each.quantity }], farm.storeIds[each.store]).id),
            pay: () => farm.write((write) => confirmPayment(write, paidFor(orderId))),
            pick: () => farm.write((write) => pickPlug(write, orderId, code)),
            undo: () => farm.write((write) => undoPick(write, orderId, pickOf(code))),
            cancel: () => farm.write((write) => cancelOrder(write, orderId, 'x')),
            expire: () => {
              farm.wait(41 * 60_000);
              for (const id of made) farm.write((write) => expireOrder(write, id));
            },
            loss: () => {
              givenLoss(farm, [code]);
              lossCame = true;
            },
            pack: () =>
              farm.write((write) => packOrder(write, orderId, { boxes: 1, acceptMissing: true, supplies: [] })),
            ship: () => farm.write((write) => shipOrder(write, orderId, { carrier: 'x', tracking: '' })),
          };
          refusedOrDone(acts[each.act]);

          for (const batch of counts()) {
            expect(batch.onRacks + batch.picked + batch.sold + batch.lost).toBe(batch.cut);
            if (!lossCame) expect(batch.held).toBeLessThanOrEqual(batch.onRacks);
          }
          for (const { wanted, picked, held } of promises()) {
            expect(picked + held).toBeLessThanOrEqual(wanted);
            if (!lossCame) expect(picked + held).toBe(wanted);
          }
        }

        function paidFor(orderId: string) {
          const order = farm.db
            .select()
            .from(orders)
            .where(sql`id = ${orderId}`)
            .get();
          return {
            sessionId: `cs_${orderId}`,
            orderId,
            intentId: null,
            amountMinor: order?.totalMinor ?? 0,
            currency: 'EUR',
          };
        }

        function pickOf(code: string): string {
          const where = sql`plug_code = ${code} AND undone_at IS NULL`;
          return farm.db.select().from(picks).where(where).get()?.id ?? '';
        }

        function counts(): BatchCount[] {
          const inKind = (kind: string) => sql`(SELECT coalesce(sum(s.pieces), 0) FROM stock_balance AS s
            JOIN stock_account AS a ON a.id = s.account_id WHERE s.batch_id = b.id AND a.kind = ${kind})`;
          return farm.db.all<BatchCount>(sql`SELECT b.id, b.pieces AS cut, ${inKind('rack')} AS onRacks,
            ${inKind('order')} AS picked, ${inKind('sold')} AS sold, ${inKind('lost')} AS lost,
            (SELECT coalesce(sum(h.pieces), 0) FROM hold AS h WHERE h.batch_id = b.id) AS held FROM batch AS b`);
        }

        function promises() {
          return farm.db.all<{ wanted: number; picked: number; held: number }>(sql`
            SELECT l.quantity AS wanted,
              (SELECT count(*) FROM pick AS p WHERE p.order_line_id = l.id AND p.undone_at IS NULL) AS picked,
              (SELECT coalesce(sum(h.pieces), 0) FROM hold AS h WHERE h.order_line_id = l.id) AS held
            FROM order_line AS l JOIN "order" AS o ON o.id = l.order_id WHERE o.state IN ('placed', 'paid', 'picking')`);
        }

        expect(farm.db.select().from(plugs).all()).toHaveLength(CUT);
      }),
      { numRuns: 40 },
    );
  }, 120_000);
});

/** Refusals in words are the point; anything else is a fault. */
function refusedOrDone(act: () => unknown): void {
  try {
    act();
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
  }
}
