import { formatMoney, moneyInput, parseMoney } from '@lampwright/geometry/price';
import { z } from 'zod';
import type { MoneyManner } from '../../lib/money';

/** An amount as it is typed; minor units come out. Not nothing, and not above the most there is. */
export const amountTyped = ({ currency, locale }: MoneyManner, mostMinor: number) =>
  z.string().transform((text, ctx): number => {
    const minor = parseMoney(text, currency, locale);
    if (minor === null)
      ctx.addIssue({
        code: 'custom',
        message: `Please enter an amount, such as ${moneyInput(mostMinor, currency, locale)}.`,
      });
    else if (minor === 0) ctx.addIssue({ code: 'custom', message: 'Please enter an amount above nothing.' });
    else if (minor > mostMinor)
      ctx.addIssue({
        code: 'custom',
        message: `That is more than the ${formatMoney(mostMinor, currency, locale)} there is.`,
      });
    return minor ?? 0;
  });

/** What of an amount stands in the field to begin with. */
export const typedAmount = (amountMinor: number, { currency, locale }: MoneyManner): string =>
  moneyInput(amountMinor, currency, locale);
