import type { TimelineEvent } from './api';

export interface Day {
  /** Year-month-day where the person is. */
  readonly day: string;
  readonly events: readonly TimelineEvent[];
}

const dayOf = (iso: string): string => {
  const at = new Date(iso);
  const two = (n: number) => String(n).padStart(2, '0');
  return `${at.getFullYear()}-${two(at.getMonth() + 1)}-${two(at.getDate())}`;
};

/** Events under the days on which they happened, in the order they came. */
export function byDay(events: readonly TimelineEvent[]): readonly Day[] {
  const days: { day: string; events: TimelineEvent[] }[] = [];
  for (const event of events) {
    const day = dayOf(event.at);
    const last = days.at(-1);
    if (last?.day === day) last.events.push(event);
    else days.push({ day, events: [event] });
  }
  return days;
}
