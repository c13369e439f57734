import fc from 'fast-check';
import { all, type BigNumber, bignumber, create } from 'mathjs';
import { describe, expect, it } from 'vitest';
import {
  amountFor,
  formatMoney,
  minorDigits,
  moneyInput,
  parseMoney,
  percentOf,
  percentOfDown,
  priceFor,
  proportionOf,
  roundedUp,
} from './index.js';

const seed = Date.now() % 1_000_000_007;
const checked = <T>(property: fc.IProperty<T>) => fc.assert(property, { seed, numRuns: 500 });

/** Decimal arithmetic of mathjs with 64 digits: the reference for every rounding here. */
const exact = create(all ?? {}, { number: 'BigNumber', precision: 64 });
const big = (n: number | string) => exact.bignumber(n) as BigNumber;
/** Half away from nothing, as decimal.js rounds by default. */
const whole = (n: unknown) => Number((n as BigNumber).toDecimalPlaces(0, 4).toString());

const amount = fc.integer({ min: 0, max: 1_000_000_000_000 });
const percent = fc.integer({ min: 0, max: 1_000_000 }).map((n) => n / 10_000);
const quantity = fc.integer({ min: 0, max: 1_000_000_000 }).map((n) => n / 1000);
const per = fc.integer({ min: 1, max: 100_000_000 }).map((n) => n / 1000);

describe(`money, against mathjs in 64 digits (seed ${seed})`, () => {
  it('takes percents', () => {
    checked(
      fc.property(amount, percent, (a, p) => {
        const product = exact.divide(exact.multiply(big(a), big(String(p))), big(100));
        expect(percentOf(a, p)).toBe(whole(product));
        expect(percentOfDown(a, p)).toBe(Number((product as BigNumber).floor().toString()));
      }),
    );
  });

  it('prices quantities at a sum for so many', () => {
    checked(
      fc.property(fc.integer({ min: 0, max: 10_000_000 }), quantity, per, (sum, q, n) => {
        const product = exact.divide(exact.multiply(big(sum), big(String(q))), big(String(n)));
        fc.pre((product as BigNumber).lt(1e15));
        expect(amountFor(q, sum, n)).toBe(whole(product));
      }),
    );
  });

  it('puts overhead and profit on top, and rounds once', () => {
    checked(
      fc.property(
        fc.integer({ min: 0, max: 10_000_000 }),
        fc.integer({ min: 0, max: 1_000_000 }).map((n) => n / 1000),
        percent,
        fc.constantFrom('markup' as const, 'margin' as const),
        fc.integer({ min: 0, max: 950_000 }).map((n) => n / 10_000),
        (cost, q, overhead, by, profit) => {
          const share = exact.divide(big(String(profit)), big(100));
          const factor = by === 'markup' ? exact.add(1, share) : exact.divide(1, exact.subtract(1, share));
          const loaded = exact.multiply(
            exact.multiply(big(cost), big(String(q))),
            exact.add(1, exact.divide(big(String(overhead)), big(100))),
          );
          const price = exact.multiply(loaded, factor) as unknown as BigNumber;
          // A quotient that never ends may lie on a half within the last digits of the reference only.
          const near = price.minus(price.floor()).minus(bignumber(0.5)).abs();
          fc.pre(near.eq(0) || near.gt(1e-30));
          expect(priceFor(q, cost, 1, { overheadPercent: overhead, profit: { by, percent: profit } })).toBe(
            whole(price),
          );
        },
      ),
    );
  });

  it('shares amounts in proportion', () => {
    checked(
      fc.property(amount, amount, amount, (a, part, all) => {
        fc.pre(all > 0 && part <= all);
        expect(proportionOf(a, part, all)).toBe(
          whole(exact.divide(exact.multiply(big(a), big(part)), big(all))),
        );
      }),
    );
    expect(proportionOf(500, 0, 0)).toBe(0);
  });
});

describe('money', () => {
  it('takes a margin of the price and a markup of the cost', () => {
    const on = (by: 'markup' | 'margin') => ({ overheadPercent: 0, profit: { by, percent: 40 } });
    expect(priceFor(1, 600, 1, on('margin'))).toBe(1000);
    expect(priceFor(1, 600, 1, on('markup'))).toBe(840);
  });

  it('rounds halves away from nothing', () => {
    expect(percentOf(50, 1)).toBe(1);
    expect(percentOf(49, 1)).toBe(0);
    expect(amountFor(0.5, 1, 1)).toBe(1);
  });

  it('rounds quantities up to how they are bought', () => {
    expect(roundedUp(34.2, 1)).toBe(35);
    expect(roundedUp(35, 1)).toBe(35);
    expect(roundedUp(0.1 + 0.2 + 34.7, 1)).toBe(35);
    expect(roundedUp(35.01, 1)).toBe(36);
    expect(roundedUp(251, 250)).toBe(500);
    expect(roundedUp(0, 25)).toBe(0);
  });

  it('is written and read in the manner of the locale', () => {
    expect(formatMoney(341700, 'USD', 'en-US')).toBe('$3,417.00');
    expect(formatMoney(-5, 'USD', 'en-US')).toBe('−$0.05');
    expect(formatMoney(341750, 'EUR', 'de-DE')).toBe('3.417,50\u00a0€');
    expect(formatMoney(1200, 'JPY', 'ja-JP')).toContain('1,200');
    expect(minorDigits('JPY')).toBe(0);
    expect(formatMoney(100, 'USD', 'no locale at all')).toBe('$1.00');
    const read = (text: string, currency = 'USD', locale = 'en-US') => parseMoney(text, currency, locale);
    expect(read('1,240')).toBe(124000);
    expect(read('$1,240.5')).toBe(124050);
    expect(read(' 12 ')).toBe(1200);
    expect(read('.5')).toBe(50);
    expect(read('3.417,50\u00a0€', 'EUR', 'de-DE')).toBe(341750);
    expect(read('1200', 'JPY', 'ja-JP')).toBe(1200);
    for (const wrong of ['', '$', '12.345', '1,24', 'ten', '-5', '1.2.3', '99999999999999'])
      expect(read(wrong), wrong).toBeNull();
  });

  it('reads what it wrote into a field', () => {
    checked(
      fc.property(
        amount,
        fc.constantFrom(
          ['USD', 'en-US'],
          ['EUR', 'de-DE'],
          ['EUR', 'fr-FR'],
          ['JPY', 'ja-JP'],
          ['CHF', 'de-CH'],
          ['INR', 'en-GB'],
        ),
        (a, [currency = '', locale = '']) => {
          expect(parseMoney(moneyInput(a, currency, locale), currency, locale)).toBe(a);
          expect(parseMoney(formatMoney(a, currency, locale), currency, locale)).toBe(a);
        },
      ),
    );
  });
});
