import type { Page } from '../web/page.ts';
import { html, type Markup } from '../web/html.ts';
import { TEST_CARDS, type CardErrors, type CardForm } from './cards.ts';
import { moneyText } from './money-text.ts';
import type { LineItem, Session } from './objects.ts';
import type { StoredSession } from './store.ts';

const TITLE = 'Test payment page, no money moves';
const FRAME = { place: 'Payments stand-in', note: 'test cards only' };

interface FormState {
  form: CardForm;
  errors: CardErrors;
  /** Why the bank refused the last try. */
  refusal: string | null;
}

const FIELDS = [
  { name: 'number', label: 'Card number', hint: '', inputmode: 'numeric', place: 'whole' },
  { name: 'expiry', label: 'Expiry', hint: 'MM / YY', inputmode: 'numeric', place: 'half' },
  { name: 'cvc', label: 'CVC', hint: '3 digits', inputmode: 'numeric', place: 'half' },
  { name: 'name', label: 'Name on card', hint: '', inputmode: 'text', place: 'whole' },
] as const;

export function payPage({ session, lines, intentData }: StoredSession, state: FormState): Page {
  return {
    ...FRAME,
    title: state.refusal === null ? TITLE : `Not paid: ${TITLE}`,
    body: html`
      <h1>${TITLE}</h1>
      <p class="lead">
        <strong class="figure">${moneyText(session.amount_total ?? 0, session.currency ?? '')}</strong> is
        due${intentData.description !== undefined && ` for ${intentData.description}`}. Pay with one of the test cards.
      </p>
      <div class="columns">
        <div class="stack">${summarySheet(session, lines)} ${cardsSheet(session)}</div>
        ${formSheet(session, state)}
      </div>
    `,
  };
}

export function paidPage({ session, lines }: StoredSession): Page {
  return {
    ...FRAME,
    title: 'Paid: test payment page',
    body: html`
      <h1>This is paid</h1>
      <p class="lead">
        <strong class="figure">${moneyText(session.amount_total ?? 0, session.currency ?? '')}</strong> was received as
        a test. Nothing more is to do here.
      </p>
      <p><a class="button main-act" href="${successUrl(session)}">Back to the shop</a></p>
      ${summarySheet(session, lines)}
    `,
    width: 'narrow',
  };
}

export function expiredPage({ session }: StoredSession): Page {
  return {
    ...FRAME,
    title: 'Expired: test payment page',
    body: html`
      <h1>This payment page has expired</h1>
      <p class="lead">Nothing was charged. Go back and start the payment again.</p>
      ${session.cancel_url !== null && html`<p><a class="button main-act" href="${session.cancel_url}">Go back</a></p>`}
    `,
    width: 'narrow',
  };
}

export function unknownPage(): Page {
  return {
    ...FRAME,
    title: 'No such payment page',
    body: html`
      <h1>There is no such payment page</h1>
      <p class="lead">Check the address, or start the payment again from the order.</p>
    `,
    width: 'narrow',
  };
}

/** Where a paid session sends its customer. */
export function successUrl(session: Session): string {
  return (session.success_url ?? '/').replaceAll('{CHECKOUT_SESSION_ID}', session.id);
}

function summarySheet(session: Session, lines: readonly LineItem[]): Markup {
  const currency = session.currency ?? '';
  const unitPrice = (line: LineItem) => moneyText(line.price.unit_amount ?? 0, currency);
  return html`
    <section class="sheet" aria-labelledby="summary">
      <h2 id="summary">What is paid</h2>
      <table class="lines">
        <thead>
          <tr>
            <th scope="col">Item</th>
            <th scope="col" class="number">Amount</th>
          </tr>
        </thead>
        <tbody>
          ${lines.map(
            (line) =>
              html`<tr>
                <td>${line.description} <span class="small">${line.quantity} × ${unitPrice(line)}</span></td>
                <td class="number">${moneyText(line.amount_total, currency)}</td>
              </tr>`,
          )}
        </tbody>
        <tfoot>
          <tr>
            <th scope="row">Total</th>
            <td class="number">${moneyText(session.amount_total ?? 0, currency)}</td>
          </tr>
        </tfoot>
      </table>
      ${session.customer_email !== null && html`<p class="sheet-foot">Receipt to ${session.customer_email}</p>`}
    </section>
  `;
}

function formSheet(session: Session, { form, errors, refusal }: FormState): Markup {
  // Focus leads the eye, and a screen reader, to what is to be done first.
  const firstWrong = refusal === null ? FIELDS.find(({ name }) => errors[name] !== undefined)?.name : 'number';
  return html`
    <section class="sheet" aria-labelledby="card">
      <h2 id="card">Card</h2>
      <form method="post" action="/pay/${session.id}" class="fields" autocomplete="off" novalidate>
        ${
          refusal !== null &&
          html`<p class="alert" id="refusal" role="alert"><strong>Not paid.</strong> ${refusal} Try another card.</p>`
        }
        ${FIELDS.map((field) => {
          const error = errors[field.name];
          const describedBy = [
            field.name === 'number' && refusal !== null && 'refusal',
            field.hint !== '' && `${field.name}-hint`,
            error !== undefined && `${field.name}-error`,
          ].filter((id) => id !== false);
          return html`<div class="field ${field.place}">
            <label for="${field.name}">
              ${field.label}
              ${field.hint !== '' && html`<span class="small" id="${field.name}-hint">${field.hint}</span>`}
            </label>
            <input
              id="${field.name}"
              name="${field.name}"
              value="${form[field.name]}"
              inputmode="${field.inputmode}"
              maxlength="${field.name === 'name' ? 200 : 23}"
              required
              ${describedBy.length > 0 && html`aria-describedby="${describedBy.join(' ')}"`}
              ${error !== undefined && html`aria-invalid="true"`}
              ${field.name === firstWrong && html`autofocus`}
            />
            ${error !== undefined && html`<p class="field-error" id="${field.name}-error">${error}</p>`}
          </div>`;
        })}
        <button class="main-act whole" type="submit">
          Pay ${moneyText(session.amount_total ?? 0, session.currency ?? '')}
        </button>
        ${session.cancel_url !== null && html`<a class="button whole" href="${session.cancel_url}">Cancel</a>`}
      </form>
    </section>
  `;
}

function cardsSheet(session: Session): Markup {
  return html`
    <section class="sheet" aria-labelledby="test-cards">
      <h2 id="test-cards">Test cards</h2>
      <ul class="rows">
        ${TEST_CARDS.map(
          ({ number, meaning }) =>
            html`<li>
              <span><span class="code">${grouped(number)}</span> <span class="small">${meaning}</span></span>
              <a class="button" href="/pay/${session.id}?fill=${number}#card">
                Fill in<span class="hidden"> the card: ${meaning}</span>
              </a>
            </li>`,
        )}
      </ul>
      <p class="sheet-foot">Any future expiry, any three digits, any name.</p>
    </section>
  `;
}

/** A card number in groups of four, as it is printed. */
export function grouped(number: string): string {
  return number.replace(/(.{4})(?=.)/g, '$1 ');
}
