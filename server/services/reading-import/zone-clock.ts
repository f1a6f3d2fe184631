import { instantAt, MS_PER_DAY, offsetAt } from '../../../shared/domain/days.ts';

/** An instant by the clocks of a zone. */
export interface ClockTime {
  at: number;
  /** The clocks never showed this time, or showed it twice; `at` is then the first instant after the jump, or the first of the two. */
  jump: 'skipped' | 'twice' | null;
}

/** The clocks of one zone, quick for many times of few days: most days have no clock change near them. */
export class ZoneClock {
  private readonly steady = new Map<string, number | null>();
  readonly timeZone: string;

  constructor(timeZone: string) {
    this.timeZone = timeZone;
  }

  /** @param day a real day @param minute minutes after midnight; parts of minutes are seconds */
  instant(day: string, minute: number): ClockTime {
    const wall = Date.parse(`${day}T00:00:00Z`) + Math.round(minute * 60) * 1000;
    const offset = this.steadyOffset(day);
    if (offset !== null) return { at: wall - offset, jump: null };
    const around = [-MS_PER_DAY, MS_PER_DAY].map((shift) => offsetAt(wall + shift, this.timeZone));
    const fitting = new Set(
      around.map((each) => wall - each).filter((instant) => offsetAt(instant, this.timeZone) === wall - instant),
    );
    const jump = fitting.size === 0 ? 'skipped' : fitting.size > 1 ? 'twice' : null;
    return { at: instantAt(day, minute, this.timeZone), jump };
  }

  /** The offset of a day and those beside it, where it is the same; null near a clock change. */
  private steadyOffset(day: string): number | null {
    const known = this.steady.get(day);
    if (known !== undefined) return known;
    const noon = Date.parse(`${day}T12:00:00Z`);
    const [before, at, after] = [-2, 0, 2].map((days) => offsetAt(noon + days * MS_PER_DAY, this.timeZone));
    const offset = before === at && at === after ? (at ?? null) : null;
    this.steady.set(day, offset);
    return offset;
  }
}
