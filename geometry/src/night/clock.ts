/** A day of the calendar, months from 1. */
export interface CalendarDate {
  year: number;
  month: number;
  day: number;
}

const MINUTE = 60_000;
const DAY = 24 * 60 * MINUTE;

const readers = new Map<string, Intl.DateTimeFormat>();

/** @throws RangeError when this machine knows no such time zone */
function readerOf(timeZone: string): Intl.DateTimeFormat {
  let reader = readers.get(timeZone);
  if (!reader) {
    reader = new Intl.DateTimeFormat('en-US', {
      timeZone,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
    });
    readers.set(timeZone, reader);
  }
  return reader;
}

function shownAt(at: number, timeZone: string) {
  const shown = { year: 0, month: 0, day: 0, hour: 0, minute: 0, second: 0 };
  for (const { type, value } of readerOf(timeZone).formatToParts(at))
    if (type in shown) shown[type as keyof typeof shown] = Number(value);
  return shown;
}

/** Milliseconds by which clocks in the zone are ahead of UTC at that instant. */
function offsetAt(at: number, timeZone: string): number {
  const { year, month, day, hour, minute, second } = shownAt(at, timeZone);
  return Date.UTC(year, month - 1, day, hour, minute, second) - Math.floor(at / 1000) * 1000;
}

/** The zone, or this machine's own where it knows no zone of that name. */
export function knownZone(timeZone: string): string {
  try {
    readerOf(timeZone);
    return timeZone;
  } catch {
    return new Intl.DateTimeFormat().resolvedOptions().timeZone;
  }
}

/** The day that calendars in the zone show at that instant. */
export function todayAt(timeZone: string, now: Date): CalendarDate {
  const { year, month, day } = shownAt(now.getTime(), knownZone(timeZone));
  return { year, month, day };
}

export function dayAfter({ year, month, day }: CalendarDate): CalendarDate {
  const next = new Date(Date.UTC(year, month - 1, day + 1));
  return { year: next.getUTCFullYear(), month: next.getUTCMonth() + 1, day: next.getUTCDate() };
}

/** Minutes after midnight of a clock time, `HH:MM`. */
export function minutesOf(clock: string): number {
  const [hours, minutes] = clock.split(':').map(Number);
  return hours! * 60 + minutes!;
}

/**
 * The instant at which clocks in the zone show so many minutes after midnight on that day. A time that they show
 * twice (clocks set back) is its first; one that they jump over (clocks set forward) is as much later as they jump.
 */
export function instantAt(date: CalendarDate, minutes: number, timeZone: string): Date {
  const asUtc = Date.UTC(date.year, date.month - 1, date.day) + minutes * MINUTE;
  // No zone changes its clocks twice within two days, so one of these two offsets is the right one.
  const before = offsetAt(asUtc - DAY, timeZone);
  const after = offsetAt(asUtc + DAY, timeZone);
  const fitting = [before, after].filter((offset) => offsetAt(asUtc - offset, timeZone) === offset);
  const offset = fitting.length > 0 ? Math.max(...fitting) : before;
  return new Date(asUtc - offset);
}

/** The time that clocks in the zone show, as people of the locale write it: "10:30 PM", "22:30". */
export function clockText(at: Date, timeZone: string, locale: string): string {
  return new Intl.DateTimeFormat(locale, { timeZone: knownZone(timeZone), timeStyle: 'short' }).format(at);
}
