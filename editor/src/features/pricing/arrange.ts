import {
  amountFor,
  type JobPricing,
  type LineSection,
  lineSections,
  type Quote,
  type QuoteGroup,
  type QuoteLine,
} from '@lampwright/geometry/price';

/** A manual line's key in a quote. */
export const manualKey = (id: string): string => `manual:${id}`;
export const manualIdOf = (key: string): string | null =>
  key.startsWith('manual:') ? key.slice('manual:'.length) : null;

/** A line as the screen shows it. */
export interface ShownLine extends QuoteLine {
  /** An edit of it is not in the quote's sums yet. */
  readonly ahead: boolean;
}

export interface SectionOfLines {
  readonly section: LineSection;
  readonly lines: readonly ShownLine[];
}

export interface GroupOfLines {
  readonly group: QuoteGroup;
  readonly sections: readonly SectionOfLines[];
}

/**
 * The lines of the last quote with the edits that it does not know yet: what somebody typed stands there at
 * once, while sums wait for the server.
 */
export function linesWithEdits(lines: readonly QuoteLine[], pricing: JobPricing): ShownLine[] {
  const manual = new Map(pricing.manualLines.map((line) => [manualKey(line.id), line]));
  const known = new Set(pricing.groups.map(({ id }) => id));
  const shown: ShownLine[] = [];
  for (const quoted of lines) {
    // A group that was just removed leaves its lines to the base.
    const homeless = quoted.groupId !== null && !known.has(quoted.groupId);
    const line = homeless ? { ...quoted, groupId: null } : quoted;
    if (line.origin === 'manual') {
      const written = manual.get(line.key);
      manual.delete(line.key);
      if (written) shown.push(withManual(line, written));
    } else shown.push(withOverride(line, pricing));
  }
  for (const [key, written] of manual)
    shown.push(
      withManual(
        {
          key,
          groupId: written.groupId,
          section: 'other',
          kind: written.kind,
          name: written.name,
          quantity: written.quantity,
          unit: written.unit,
          source: 'Written by hand',
          recordIds: [],
          itemId: null,
          priceMinor: null,
          costMinor: null,
          taxable: written.taxable,
          origin: 'manual',
          planned: null,
          note: '',
        },
        written,
      ),
    );
  return shown;
}

function withManual(line: QuoteLine, written: JobPricing['manualLines'][number]): ShownLine {
  const next: QuoteLine = {
    ...line,
    groupId: written.groupId,
    section: written.kind === 'labour' ? 'labour' : 'other',
    kind: written.kind,
    name: written.name,
    quantity: written.quantity,
    unit: written.unit,
    priceMinor:
      written.priceMinor === null ? line.priceMinor : amountFor(written.quantity, written.priceMinor, 1),
  };
  return { ...next, ahead: !sameLine(line, next) };
}

function withOverride(line: QuoteLine, { overrides }: JobPricing): ShownLine {
  const value = Object.hasOwn(overrides, line.key) ? overrides[line.key] : undefined;
  const plan = line.planned ?? { quantity: line.quantity, priceMinor: line.priceMinor };
  const quantity = value?.quantity ?? plan.quantity;
  const next: QuoteLine =
    value === undefined
      ? { ...line, ...plan, origin: 'plan', planned: null, note: '' }
      : {
          ...line,
          quantity,
          // A price that follows the quantity is the server's to work out.
          priceMinor: value.priceMinor ?? (line.quantity === quantity ? line.priceMinor : plan.priceMinor),
          origin: 'overridden',
          planned: plan,
          note: value.note,
        };
  return { ...next, ahead: !sameLine(line, next) };
}

const sameLine = (a: QuoteLine, b: QuoteLine): boolean =>
  a.quantity === b.quantity &&
  a.priceMinor === b.priceMinor &&
  a.groupId === b.groupId &&
  a.name === b.name &&
  a.unit === b.unit &&
  a.origin === b.origin;

/** Lines by group (the base first) and section, in the order of a quote; a group without lines is kept. */
export function arrange(groups: readonly QuoteGroup[], lines: readonly ShownLine[]): GroupOfLines[] {
  return groups.map((group) => {
    const own = lines.filter((line) => line.groupId === group.id);
    const sections = lineSections.flatMap((section) => {
      const of = own.filter((line) => line.section === section);
      return of.length === 0 ? [] : [{ section, lines: of }];
    });
    return { group, sections };
  });
}

/** Groups of the quote, with the names that are being typed and those it does not know yet. */
export function groupsWithEdits(quote: Pick<Quote, 'groups'>, pricing: JobPricing): QuoteGroup[] {
  const known = new Map(quote.groups.map((group) => [group.id, group]));
  const base = known.get(null);
  const own = pricing.groups.map((group) => ({
    ...group,
    fixtures: known.get(group.id)?.fixtures ?? 0,
    priceMinor: known.get(group.id)?.priceMinor ?? 0,
  }));
  return base ? [base, ...own] : own;
}
