import type { TodayText } from '../../../shared/contracts/today.ts';
import { type Quantity, fromCanonical, unitOf, unitsOf } from '../../../shared/domain/units.ts';

/** Mails can't know each reader's units: they speak the usual ones. */
const USUAL_UNITS: Partial<Record<Quantity, string>> = { alkalinity: 'dKH' };

/** Words with values as one plain text, times on the farm's clock. */
export function plainWords(text: TodayText, timeZone: string): string {
  return text
    .map((part) => {
      if (typeof part === 'string') return part;
      if ('quantity' in part) return quantityText(part.quantity, part.value);
      return 'clock' in part ? clockText(part.clock, timeZone) : dayText(part.day);
    })
    .join('');
}

export function clockText(instant: number, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone, weekday: 'short', hour: '2-digit', minute: '2-digit' }).format(
    instant,
  );
}

/** Stored units and their multiples have no offset, so a difference is written like a level. */
function quantityText(quantity: Quantity, value: number): string {
  const unit = USUAL_UNITS[quantity] ?? unitsOf(quantity)[0] ?? '';
  const { label, decimals } = unitOf(quantity, unit);
  const number = fromCanonical(quantity, value, unit).toFixed(decimals);
  return label === '' ? number : `${number}\u00a0${label}`;
}

function dayText(day: string): string {
  return new Intl.DateTimeFormat('en-GB', { timeZone: 'UTC', weekday: 'short', day: 'numeric', month: 'short' }).format(
    Date.parse(`${day}T00:00:00Z`),
  );
}
