import type { JobPricing } from '@lampwright/geometry/price';
import { count } from '../../lib/format';
import { type MoneyManner, moneyOf } from '../../lib/money';
import type { ClashPart } from './store/rebase';
import { numberText, percentText } from './words';

export interface ClashNames {
  readonly line: (key: string) => string;
  readonly record: (id: string) => string;
  readonly item: (id: string) => string;
  readonly tax: (id: string) => string;
}

/** What a clash is about. */
export function clashTitle(part: ClashPart, mine: JobPricing, theirs: JobPricing, names: ClashNames): string {
  const named = <T extends { id: string; name: string }>(of: (p: JobPricing) => readonly T[], what: string) =>
    [...of(mine), ...of(theirs)].find(({ id }) => id === part.id)?.name ?? what;
  switch (part.part) {
    case 'group':
      return named((p) => p.groups, 'A group');
    case 'manual-line':
      return named((p) => p.manualLines, 'A line by hand');
    case 'override':
      return names.line(part.id);
    case 'member':
      return `Group of ${names.record(part.id)}`;
    case 'control':
      return `Control of ${names.record(part.id)}`;
    case 'tax':
      return 'Tax';
    case 'tax-exempt':
      return 'Exempt from tax';
    case 'discount':
      return 'Discount';
    case 'visits':
      return 'Aiming visits';
    case 'stages':
      return 'Payment stages';
  }
}

/** What one side says about it. */
export function clashValue(
  part: ClashPart,
  pricing: JobPricing,
  names: ClashNames,
  manner: MoneyManner,
): string {
  const money = moneyOf(manner);
  switch (part.part) {
    case 'group': {
      const group = pricing.groups.find(({ id }) => id === part.id);
      if (!group) return 'removed';
      const text = `${group.name}, ${group.on ? 'taken' : 'offered'}`;
      return group.description === '' ? text : `${text}: ${group.description}`;
    }
    case 'manual-line': {
      const line = pricing.manualLines.find(({ id }) => id === part.id);
      if (!line) return 'removed';
      const each = line.priceMinor ?? line.costMinor;
      return `${line.name}, ${numberText(line.quantity, manner.locale)}${each === null ? '' : ` at ${money(each)}`}`;
    }
    case 'override': {
      const value = pricing.overrides[part.id];
      if (!value) return 'as the plan says';
      return [
        value.quantity === null ? null : `quantity ${numberText(value.quantity, manner.locale)}`,
        value.priceMinor === null ? null : money(value.priceMinor),
        value.note === '' ? null : `“${value.note}”`,
      ]
        .filter((text) => text !== null)
        .join(', ');
    }
    case 'member': {
      const id = pricing.members[part.id];
      return pricing.groups.find((group) => group.id === id)?.name ?? 'Base';
    }
    case 'control': {
      if (!Object.hasOwn(pricing.controls, part.id)) return 'the company’s';
      const id = pricing.controls[part.id] ?? null;
      return id === null ? 'none' : names.item(id);
    }
    case 'tax':
      return pricing.taxId === null ? 'the company’s' : names.tax(pricing.taxId);
    case 'tax-exempt':
      return pricing.taxExempt ? 'yes' : 'no';
    case 'discount': {
      const { discount } = pricing;
      switch (discount.kind) {
        case 'none':
          return 'none';
        case 'percent':
          return percentText(discount.percent, manner.locale);
        case 'amount':
          return money(discount.amountMinor);
      }
      return '';
    }
    case 'visits':
      return pricing.aimingVisits === null ? 'the company’s' : String(pricing.aimingVisits);
    case 'stages':
      return pricing.stages === null
        ? 'the company’s'
        : `${count(pricing.stages.length, 'stage')}: ${pricing.stages
            .map(({ name, percent }) => `${name} ${percentText(percent, manner.locale)}`)
            .join(', ')}`;
  }
}
