import { randomUUID } from 'node:crypto';
import type { AddressObject, Attachment, ParsedMail } from 'mailparser';

/** Older mails make room for newer ones, so that a long-running demo doesn't fill the memory. */
const MOST_KEPT = 500;

export interface Mail {
  id: string;
  /** When it was received, epoch ms. */
  receivedAt: number;
  from: string;
  to: string;
  cc: string;
  /** Who it was really handed over for, blind copies included. */
  recipients: string[];
  subject: string;
  text: string;
  html: string | null;
  attachments: Attachment[];
}

/** The mails received since the start or the last clearing. */
export class Inbox {
  #mails: Mail[] = [];

  /** Newest first. */
  get mails(): readonly Mail[] {
    return this.#mails;
  }

  add(parsed: ParsedMail, recipients: string[], receivedAt: number): void {
    const mail: Mail = {
      id: randomUUID(),
      receivedAt,
      from: addressText(parsed.from),
      to: addressText(parsed.to),
      cc: addressText(parsed.cc),
      recipients,
      subject: parsed.subject ?? '(no subject)',
      text: parsed.text ?? '',
      html: parsed.html || null,
      // Pictures inside the HTML are part of it already.
      attachments: parsed.attachments.filter((attachment) => !attachment.related),
    };
    this.#mails = [mail, ...this.#mails].slice(0, MOST_KEPT);
  }

  find(id: string): Mail | undefined {
    return this.#mails.find((mail) => mail.id === id);
  }

  clear(): void {
    this.#mails = [];
  }
}

/** Addresses as `Name <address>`; the parser's own text puts every name in quotes. */
function addressText(addresses: AddressObject | AddressObject[] | undefined): string {
  return [addresses ?? []]
    .flat()
    .flatMap(({ value }) => value)
    .map(({ name, address }) => (name === '' ? (address ?? '') : `${name} <${address ?? ''}>`))
    .join(', ');
}
