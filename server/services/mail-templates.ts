import { outboxMails } from '../db/schema/index.ts';
import type { Write } from '../db/write.ts';
import type { Deps } from '../deps.ts';
import type { Mail } from '../outside/mail-transport.ts';
import { alertMail } from './mails/alert-mail.ts';
import { digestMail } from './mails/digest-mail.ts';
import { invitationMail } from './mails/invitation-mail.ts';
import {
  orderCancelledMail,
  orderPaidMail,
  orderPlacedMail,
  orderRefundedMail,
  orderShippedMail,
} from './mails/order-mails.ts';
import { passwordResetMail } from './mails/password-reset-mail.ts';

export type MailBody = Omit<Mail, 'id' | 'to'>;
type Template = (deps: Deps, data: Record<string, unknown>) => MailBody | Promise<MailBody>;

/** Every mail the product sends, by template name. Each area's mails live in `server/services/mails/`. */
const TEMPLATES: Record<string, Template> = {
  alerts: alertMail,
  digest: digestMail,
  invitation: invitationMail,
  'order-cancelled': orderCancelledMail,
  'order-paid': orderPaidMail,
  'order-placed': orderPlacedMail,
  'order-refunded': orderRefundedMail,
  'order-shipped': orderShippedMail,
  'password-reset': passwordResetMail,
};

/** Queues a mail in the transaction that causes it. */
export function queueMail(write: Write, template: string, to: string, data: Record<string, unknown>): void {
  write.tx
    .insert(outboxMails)
    .values({ id: write.newId(), template, toAddress: to, data, createdAt: write.now, nextAttemptAt: write.now })
    .run();
}

/** The mail of a row of the outbox, as it reads now. */
export async function renderMail(deps: Deps, row: typeof outboxMails.$inferSelect): Promise<MailBody> {
  const template = TEMPLATES[row.template];
  if (!template) throw new Error(`There is no mail template ${row.template}.`);
  return template(deps, row.data);
}
