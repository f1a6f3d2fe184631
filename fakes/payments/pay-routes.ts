import { Router, urlencoded, type Response } from 'express';
import { sendPage } from '../web/page.ts';
import { CardForm, readCard, TEST_CARDS } from './cards.ts';
import type { Payments } from './context.ts';
import { expiredPage, grouped, paidPage, payPage, successUrl, unknownPage } from './pay-page.ts';
import { paySession } from './pay.ts';
import type { StoredSession } from './store.ts';

const EMPTY_FORM: CardForm = { number: '', expiry: '', cvc: '', name: '' };

/** The hosted payment page that a session's `url` points to. */
export function payRoutes(payments: Payments): Router {
  const router = Router();

  router.get('/pay/:sessionId', (req, res) => {
    const stored = payments.store.sessions.get(req.params.sessionId);
    if (stored?.session.status !== 'open') return sendClosed(res, stored);
    sendPage(res, payPage(stored, { form: filledForm(req.query['fill']), errors: {}, refusal: null }));
  });

  router.post('/pay/:sessionId', urlencoded({ extended: false, limit: '10kb' }), (req, res) => {
    const stored = payments.store.sessions.get(req.params.sessionId ?? '');
    // A second press of the button after the first went through must lead on, not charge again.
    if (stored?.session.status === 'complete') return res.redirect(303, successUrl(stored.session));
    if (stored?.session.status !== 'open') return sendClosed(res, stored);

    const form = CardForm.catch(EMPTY_FORM).parse(req.body);
    const reading = readCard(form, payments.now());
    const shown = { ...form, cvc: '' };
    if ('errors' in reading) {
      return sendPage(res, payPage(stored, { form: shown, errors: reading.errors, refusal: null }), 422);
    }
    const decline = paySession(payments, stored, reading.card);
    if (decline !== null) {
      return sendPage(res, payPage(stored, { form: shown, errors: {}, refusal: decline.message }), 402);
    }
    res.redirect(303, successUrl(stored.session));
  });

  return router;
}

function sendClosed(res: Response, stored: StoredSession | undefined): void {
  if (stored === undefined) sendPage(res, unknownPage(), 404);
  else if (stored.session.status === 'complete') sendPage(res, paidPage(stored));
  else sendPage(res, expiredPage(stored), 410);
}

/** The form with one of the test cards filled in, for people without a card number at hand. */
function filledForm(number: unknown): CardForm {
  const card = TEST_CARDS.find((each) => each.number === number);
  if (card === undefined) return EMPTY_FORM;
  return { number: grouped(card.number), expiry: '12 / 39', cvc: '123', name: 'Test Buyer' };
}
