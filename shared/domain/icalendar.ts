import type { Day } from './days.ts';
import type { RepeatRule } from './repeat-rule.ts';

/** RFC 5545, section 3.1: lines are no longer than 75 octets, without their break. */
const MOST_OCTETS = 75;
const LINE_BREAK = '\r\n';
const PRODUCT = '-//Limestead//Farm tasks//EN';
/** How often calendars should look again (RFC 7986, section 5.7). */
const LOOK_AGAIN = 'PT1H';

export interface CalendarEvent {
  /** The same for ever for the same event, and of no other (RFC 5545, section 3.8.4.7). */
  uid: string;
  /** When it was last written, epoch ms. */
  stamp: number;
  summary: string;
  description?: string;
  url?: string;
  /** A whole day of the farm, which shows as such in every zone, or an instant with its length. */
  when: { day: Day } | { at: number; minutes: number };
  /** Value of RRULE, from {@link recurrenceOf}. */
  recurrence?: string | null;
  /** More days of the same event, for those without a rule. */
  moreDays?: readonly Day[];
}

/**
 * A calendar as text (RFC 5545): content lines that end in CRLF and are folded, one VEVENT for each event.
 *
 * @param stampedEvents events with whole days or instants in UTC, so that no time zone needs to be described
 */
export function calendarText(name: string, stampedEvents: readonly CalendarEvent[]): string {
  const lines = [
    'BEGIN:VCALENDAR',
    'VERSION:2.0',
    `PRODID:${PRODUCT}`,
    'CALSCALE:GREGORIAN',
    'METHOD:PUBLISH',
    `NAME:${escapedText(name)}`,
    `X-WR-CALNAME:${escapedText(name)}`,
    `REFRESH-INTERVAL;VALUE=DURATION:${LOOK_AGAIN}`,
    ...stampedEvents.flatMap(eventLines),
    'END:VCALENDAR',
  ];
  return lines.map((line) => `${folded(line)}${LINE_BREAK}`).join('');
}

/**
 * How work repeats, as the value of RRULE (RFC 5545, sections 3.3.10 and 3.8.5.3), counted from a first day that is one
 * of its own. Where a month lacks the day, its last one is meant, which BYSETPOS picks.
 *
 * @returns null where no rule can say it: a list of days, or a count from the day that work was done
 */
export function recurrenceOf(rule: RepeatRule): string | null {
  switch (rule.every) {
    case 'days':
      return `FREQ=DAILY;INTERVAL=${rule.interval}`;
    case 'weeks': {
      const days = [...rule.weekdays].sort().map(weekdayCode).join(',');
      return `FREQ=WEEKLY;INTERVAL=${rule.interval};BYDAY=${days};WKST=MO`;
    }
    case 'months':
      return `FREQ=MONTHLY;INTERVAL=${rule.interval};${monthDayPart(rule.monthDay)}`;
    case 'months_on':
      return `FREQ=MONTHLY;INTERVAL=${rule.interval};BYDAY=${rule.week}${weekdayCode(rule.weekday)}`;
    case 'dates':
    case 'after_done':
      return null;
  }
}

/** Text as a value: backslash, semicolon, comma and line breaks are escaped (section 3.3.11); other controls are dropped. */
export function escapedText(text: string): string {
  return text
    .replaceAll('\\', '\\\\')
    .replaceAll(';', '\\;')
    .replaceAll(',', '\\,')
    .replaceAll(/\r\n|\r|\n/g, '\\n')
    .replaceAll(CONTROLS, '');
}

/** A content line broken into pieces of 75 octets at most; each further one begins with a blank (section 3.1). */
export function folded(line: string): string {
  const pieces: string[] = [];
  let piece = '';
  let octets = 0;
  // By code point, so that no character of several octets is torn apart.
  for (const character of line) {
    const size = octetsOf(character.codePointAt(0) ?? 0);
    if (octets + size > MOST_OCTETS) {
      pieces.push(piece);
      piece = ' ';
      octets = 1;
    }
    piece += character;
    octets += size;
  }
  return [...pieces, piece].join(LINE_BREAK);
}

/** Control characters but the tab, which section 3.1 allows. */
const CONTROLS = /(?!\t)\p{Cc}/gu;
const WEEKDAY_CODES = ['MO', 'TU', 'WE', 'TH', 'FR', 'SA', 'SU'];
/** The longest day that every month has. */
const SAFE_MONTH_DAY = 28;

function eventLines(event: CalendarEvent): string[] {
  const { uid, stamp, summary, description, url, when, recurrence, moreDays = [] } = event;
  return [
    'BEGIN:VEVENT',
    `UID:${uid}`,
    `DTSTAMP:${utcTime(stamp)}`,
    ...('day' in when
      ? [`DTSTART;VALUE=DATE:${basicDay(when.day)}`]
      : [`DTSTART:${utcTime(when.at)}`, `DURATION:PT${when.minutes}M`]),
    ...(recurrence ? [`RRULE:${recurrence}`] : []),
    ...(moreDays.length > 0 ? [`RDATE;VALUE=DATE:${moreDays.map(basicDay).join(',')}`] : []),
    `SUMMARY:${escapedText(summary)}`,
    ...(description ? [`DESCRIPTION:${escapedText(description)}`] : []),
    ...(url ? [`URL:${url}`] : []),
    // Work to do does not block the day for meetings.
    'TRANSP:TRANSPARENT',
    'END:VEVENT',
  ];
}

function monthDayPart(monthDay: number): string {
  if (monthDay <= SAFE_MONTH_DAY) return `BYMONTHDAY=${monthDay}`;
  const days = Array.from({ length: monthDay - SAFE_MONTH_DAY + 1 }, (_, index) => SAFE_MONTH_DAY + index);
  return `BYMONTHDAY=${days.join(',')};BYSETPOS=-1`;
}

function weekdayCode(weekday: number): string {
  return WEEKDAY_CODES[weekday - 1] ?? '';
}

function basicDay(day: Day): string {
  return day.replaceAll('-', '');
}

function utcTime(instantMs: number): string {
  return `${new Date(instantMs).toISOString().slice(0, 19).replaceAll(/[-:]/g, '')}Z`;
}

/** Length of a code point in UTF-8 (RFC 3629). */
function octetsOf(codePoint: number): number {
  if (codePoint < 0x80) return 1;
  if (codePoint < 0x800) return 2;
  return codePoint < 0x10000 ? 3 : 4;
}
