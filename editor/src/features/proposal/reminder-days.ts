import { z } from 'zod';

const MOST = 5;
const LAST_DAY = 180;

/** Days as they are typed, "3, 7, 14", to numbers in order; an empty field means no reminders. */
export const reminderDaysTyped = z.string().transform((text, ctx): number[] => {
  const refuse = (message: string): number[] => {
    ctx.addIssue({ code: 'custom', message });
    return [];
  };
  const parts = text.split(/[\s,;]+/).filter((part) => part !== '');
  const days = [...new Set(parts.map((part) => (/^\d{1,3}$/.test(part) ? Number(part) : Number.NaN)))];
  if (days.some((n) => !(n >= 1 && n <= LAST_DAY)))
    return refuse(`Please write whole days from 1 to ${LAST_DAY}, such as 3, 7, 14.`);
  if (days.length > MOST) return refuse(`At most ${MOST} reminders.`);
  return days.sort((a, b) => a - b);
});

export const typedDays = (days: readonly number[]): string => days.join(', ');
