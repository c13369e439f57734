/** "12 Mar 2026", in the browser's language. */
export function formatDay(iso: string, locale?: string): string {
  // A bare date means that day wherever it is read: noon keeps it clear of every time zone's midnight.
  const date = new Date(/^\d{4}-\d{2}-\d{2}$/.test(iso) ? `${iso}T12:00:00` : iso);
  return new Intl.DateTimeFormat(locale, { day: 'numeric', month: 'short', year: 'numeric' }).format(date);
}

export function formatMoment(iso: string, locale?: string): string {
  return new Intl.DateTimeFormat(locale, {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: 'numeric',
    minute: '2-digit',
  }).format(new Date(iso));
}

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const DAY = 24 * HOUR;

/** "just now", "5 minutes ago", "yesterday"; older than a week as a date. */
export function formatAgo(iso: string, now: number, locale?: string): string {
  const age = now - Date.parse(iso);
  if (age < MINUTE) return 'just now';
  const relative = new Intl.RelativeTimeFormat(locale, { numeric: 'auto' });
  if (age < HOUR) return relative.format(-Math.floor(age / MINUTE), 'minute');
  if (age < DAY) return relative.format(-Math.floor(age / HOUR), 'hour');
  if (age < 7 * DAY) return relative.format(-Math.floor(age / DAY), 'day');
  return formatDay(iso, locale);
}

/** "1 fault", "3 faults". */
export const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;
