/** Days from the first to the last, both in it: year-month-day. */
export interface Period {
  readonly from: string;
  readonly to: string;
}

export const periodNames = ['month', 'quarter', 'year', 'last-year', 'own'] as const;
export type PeriodName = (typeof periodNames)[number];

export function periodLabel(name: PeriodName): string {
  switch (name) {
    case 'month':
      return 'This month';
    case 'quarter':
      return 'Last three months';
    case 'year':
      return 'This year';
    case 'last-year':
      return 'Last year';
    case 'own':
      return 'From … to …';
  }
}

const day = (year: number, month: number, date: number): string => {
  const at = new Date(Date.UTC(year, month, date));
  return at.toISOString().slice(0, 10);
};

/** The days that a period means, seen from a day where the person is. */
export function periodOf(name: Exclude<PeriodName, 'own'>, today: Date): Period {
  const year = today.getFullYear();
  const month = today.getMonth();
  const to = day(year, month, today.getDate());
  switch (name) {
    case 'month':
      return { from: day(year, month, 1), to };
    case 'quarter':
      return { from: day(year, month - 2, 1), to };
    case 'year':
      return { from: day(year, 0, 1), to };
    case 'last-year':
      return { from: day(year - 1, 0, 1), to: day(year - 1, 11, 31) };
  }
}

const isDay = (text: string | null): text is string =>
  text !== null && /^\d{4}-\d{2}-\d{2}$/.test(text) && !Number.isNaN(Date.parse(text));

export interface Ask {
  readonly name: PeriodName;
  readonly period: Period;
}

/** The period that an address asks for; this year where it says nothing usable. */
export function readPeriod(params: URLSearchParams, today: Date): Ask {
  const from = params.get('from');
  const to = params.get('to');
  if (isDay(from) && isDay(to))
    return { name: 'own', period: from <= to ? { from, to } : { from: to, to: from } };
  const name = periodNames.find((each) => each === params.get('period'));
  const known = name === undefined || name === 'own' ? 'year' : name;
  return { name: known, period: periodOf(known, today) };
}

export const writePeriod = (name: PeriodName, period: Period): URLSearchParams =>
  new URLSearchParams(name === 'own' ? { ...period } : { period: name });
