import { count } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import type { Numbers } from './api';

export interface Figure {
  readonly name: string;
  readonly figure: string;
  /** What it counts, and what it doesn't. */
  readonly sentence: string;
}

/** A share of so few says little; it is told as a count then. */
const FEW = 5;

const share = (part: number, locale: string): string =>
  new Intl.NumberFormat(locale, { style: 'percent', maximumFractionDigits: 0 }).format(part);

/** Days as people say them: "3 days", "half a day or less". */
export const daysWord = (days: number): string =>
  days <= 0.5 ? 'half a day or less' : count(Math.round(days * 2) / 2, 'day');

/** The numbers of a time, each with what it means. */
export function figuresOf(numbers: Numbers): readonly Figure[] {
  const money = moneyOf(numbers);
  const { sent, won, declined, waiting, wonShare, medianDaysToYes } = numbers;
  return [
    {
      name: 'Proposals sent',
      figure: String(sent),
      sentence: `First sent in this time, worth ${money(numbers.sentMinor)} together.`,
    },
    {
      name: 'Won',
      figure: wonShare === null || sent < FEW ? `${won} of ${sent}` : share(wonShare, numbers.locale),
      sentence:
        sent === 0
          ? 'Of those sent in this time, approved by now.'
          : `${won} of the ${sent} approved by now, ${declined} declined, ${waiting} without an answer.${
              sent < FEW ? ' Too few for a share.' : ''
            }`,
    },
    {
      name: 'Value won',
      figure: money(numbers.wonMinor),
      sentence: 'What those approvals come to, change orders included.',
    },
    {
      name: 'Days to yes',
      figure: medianDaysToYes === null ? '–' : daysWord(medianDaysToYes),
      sentence:
        medianDaysToYes === null
          ? 'From first sending to approval; none was approved yet.'
          : 'From first sending to approval: half of the won ones took longer, half less.',
    },
    {
      name: 'Received',
      figure: money(numbers.receivedMinor),
      sentence: 'Money that came in during this time, less what was paid back.',
    },
    {
      name: 'Still to come in',
      figure: money(numbers.outstandingMinor),
      sentence: 'Agreed and not paid yet, over all time: this one does not follow the period.',
    },
  ];
}

/** Nothing at all to tell. */
export const isEmpty = ({ sent, receivedMinor, outstandingMinor }: Numbers): boolean =>
  sent === 0 && receivedMinor === 0 && outstandingMinor === 0;
