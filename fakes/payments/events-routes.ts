import { Router } from 'express';
import { sendPage } from '../web/page.ts';
import type { Payments } from './context.ts';
import { eventsPage } from './events-page.ts';

/** What was sent to the webhook address: a page for browsers, JSON for everything else. */
export function eventRoutes({ store, deliveries }: Payments): Router {
  const router = Router();

  router.get('/', (_req, res) => res.redirect('/_events'));

  router.get('/_events', (req, res) => {
    const events = [...store.events.values()].reverse();
    if (req.accepts(['json', 'html']) === 'html') sendPage(res, eventsPage(events, deliveries.url));
    else res.json({ events });
  });

  router.post('/_events/:id/resend', async (req, res) => {
    const stored = store.events.get(req.params.id);
    if (stored === undefined) {
      res.status(404).json({ error: { message: 'There is no such event.' } });
      return;
    }
    await deliveries.resend(stored);
    if (req.accepts(['json', 'html']) === 'html') res.redirect(303, '/_events');
    else res.json(stored);
  });

  return router;
}
