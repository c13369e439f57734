import type { CatalogueCategory, CatalogueItem, FixtureKind, PartItem } from '../catalogue/index.js';
import {
  type FixtureRecord,
  itemOf,
  labelOf,
  type PlanDocument,
  recordOf,
  recordsOf,
} from '../plan/index.js';
import { type Bill, type BillLine, Gathered, type QuoteInput, warningOf } from './bill-input.js';
import { CONNECTORS_PER_SPLICE, connectorFor, type Splice, splicesOf } from './connectors.js';
import type { PartUse } from './price-book.js';
import type { LineSection, QuoteWarning } from './quote.js';
import { counted, labelsInWords } from './words.js';

type Groups = ReadonlyMap<string, string | null>;

/** A thing of the plan, and how many of it. */
interface Piece {
  readonly recordId: string;
  readonly label: string;
  readonly count: number;
}

/** What identifies an item on lines: its catalogue entry, or else the plan's own copy. */
export function itemIdentity(
  doc: PlanDocument,
  itemRecordId: string | null,
): { readonly name: string; readonly identity: string; readonly itemId: string | null } | null {
  const record = recordOf(doc, itemRecordId, 'item');
  if (!record) return null;
  return { name: record.item.name, identity: record.sourceId ?? record.id, itemId: record.sourceId };
}

/** How a kind of fixture is held in its place: common practice, no source. */
export function mountOf(kind: FixtureKind): PartUse | null {
  switch (kind) {
    case 'path':
    case 'up':
    case 'flood':
    case 'wall-wash':
      return 'ground-stake';
    case 'down':
      return 'tree-mount';
    case 'step':
    case 'linear':
    case 'bollard':
      return 'surface-mount';
    case 'in-grade':
    case 'underwater':
      return null;
  }
}

/** The part that the company uses: the one its price book names, or the first that the catalogue has. */
export function partFor(
  use: PartUse,
  { catalogue, book }: Pick<QuoteInput, 'catalogue' | 'book'>,
): { readonly id: string; readonly item: PartItem } | null {
  const chosen = book.parts[use];
  for (const [id, item] of catalogue)
    if (item.category === 'part' && item.use === use && (chosen === null || chosen === id))
      return { id, item };
  return null;
}

const partNames: Readonly<Record<PartUse, string>> = {
  'ground-stake': 'ground stake',
  'tree-mount': 'tree mount',
  'surface-mount': 'surface mount',
  'transformer-mount': 'transformer mount',
  conduit: 'conduit',
};

export const noPart = (use: PartUse, recordIds: readonly string[]): QuoteWarning =>
  warningOf('no-part', `The catalogue has no ${partNames[use]}, so none is on the bill.`, recordIds);

/** Everything that is counted in pieces: fixtures, lamps, mounts, connectors, hubs, transformers, controls. */
export function piecesOf(doc: PlanDocument, groups: Groups, input: QuoteInput): Bill {
  const bill = new PieceBill(doc, groups, input);
  return bill.all();
}

class PieceBill {
  private readonly lines: BillLine[] = [];
  private readonly warnings: QuoteWarning[] = [];

  constructor(
    private readonly doc: PlanDocument,
    private readonly groups: Groups,
    private readonly input: QuoteInput,
  ) {}

  all(): Bill {
    this.fixtures();
    this.lamps();
    this.connectors();
    this.mounts();
    this.hubs();
    this.transformers();
    return { lines: this.lines, warnings: this.warnings };
  }

  private groupOf(recordId: string): string | null {
    return this.groups.get(recordId) ?? null;
  }

  private pieceOf(record: FixtureRecord, count = record.quantity): Piece {
    const label = labelOf(record, this.doc);
    return { recordId: record.id, label: count === 1 ? label : `${label} (${count})`, count };
  }

  /** One line for each group of what was gathered under one item. */
  private put(
    section: LineSection,
    item: { readonly name: string; readonly itemId: string | null },
    pieces: Gathered<Piece>,
    tell: (pieces: readonly Piece[]) => string = (list) => labelsInWords(list.map(({ label }) => label)),
  ): void {
    for (const { key, groupId, items } of pieces.values())
      this.lines.push({
        key,
        groupId,
        section,
        kind: 'material',
        name: item.name,
        quantity: items.reduce((sum, { count }) => sum + count, 0),
        unit: 'each',
        source: tell(items),
        recordIds: [...new Set(items.map(({ recordId }) => recordId))],
        itemId: item.itemId,
        rateMinor: null,
      });
  }

  /** Lines of plan records by the item that they name. */
  private putByItem<T>(
    section: LineSection,
    records: Iterable<T>,
    itemOfRecord: (record: T) => string | null,
    piece: (record: T) => Piece,
  ): void {
    const byItem = new Map<string, { name: string; itemId: string | null; pieces: Gathered<Piece> }>();
    for (const record of records) {
      const item = itemIdentity(this.doc, itemOfRecord(record));
      if (!item) continue;
      const found = byItem.get(item.identity) ?? { ...item, pieces: new Gathered<Piece>() };
      byItem.set(item.identity, found);
      const one = piece(record);
      found.pieces.add(`${section}:${item.identity}`, this.groupOf(one.recordId), one);
    }
    for (const item of byItem.values()) this.put(section, item, item.pieces);
  }

  private fixtures(): void {
    this.putByItem(
      'fixtures',
      recordsOf(this.doc, 'fixture'),
      ({ itemId }) => itemId,
      (record) => this.pieceOf(record),
    );
  }

  private lamps(): void {
    this.putByItem(
      'lamps',
      [...recordsOf(this.doc, 'fixture')].filter(({ lampId }) => lampId !== null),
      ({ lampId }) => lampId,
      (record) => this.pieceOf(record),
    );
  }

  private connectors(): void {
    const byItem = new Map<string, { item: CatalogueItem; pieces: Gathered<Piece> }>();
    for (const splice of splicesOf(this.doc)) {
      const found = connectorFor(splice, this.input.catalogue);
      if (!found) {
        this.warnings.push(
          warningOf(
            'no-connector',
            `The catalogue has no connector for burial that takes ${counted(splice.conductors, 'conductor')} of ${splice.thinnestMm2.toFixed(1)} to ${splice.thickestMm2.toFixed(1)} mm², as at ${this.nameOf(splice.nodeId)}.`,
            [splice.nodeId],
          ),
        );
        continue;
      }
      const entry = byItem.get(found.id) ?? { item: found.item, pieces: new Gathered<Piece>() };
      byItem.set(found.id, entry);
      entry.pieces.add(`connectors:${found.id}`, this.groupOfSplice(splice), {
        recordId: splice.nodeId,
        label: `${splice.conductors}`,
        count: CONNECTORS_PER_SPLICE,
      });
    }
    for (const [id, { item, pieces }] of byItem)
      this.put('connectors', { name: item.name, itemId: id }, pieces, (list) => {
        const sizes = list.map(({ label }) => Number(label));
        const least = Math.min(...sizes);
        const most = Math.max(...sizes);
        const range = least === most ? `${least}` : `${least} to ${most}`;
        return `${CONNECTORS_PER_SPLICE} at each of ${counted(list.length, 'splice')} of ${range} conductors`;
      });
  }

  /** A splice that is needed although its light is not taken, since cable of others passes, is shared. */
  private groupOfSplice({ nodeId, cables }: Splice): string | null {
    const group = this.groupOf(nodeId);
    const passing = cables.filter(({ id }) => this.groupOf(id) !== group);
    return passing.length >= 2 ? null : group;
  }

  private mounts(): void {
    const byUse = new Map<PartUse, Piece[]>();
    for (const fixture of recordsOf(this.doc, 'fixture')) {
      const item = itemOf(this.doc, fixture.itemId, 'fixture');
      const use = item && mountOf(item.kind);
      if (use) byUse.set(use, [...(byUse.get(use) ?? []), this.pieceOf(fixture)]);
    }
    const boxes = [...recordsOf(this.doc, 'transformer')].map(
      (t): Piece => ({ recordId: t.id, label: labelOf(t, this.doc), count: 1 }),
    );
    if (boxes.length > 0) byUse.set('transformer-mount', boxes);
    for (const [use, pieces] of byUse) {
      const part = partFor(use, this.input);
      if (!part) {
        this.warnings.push(
          noPart(
            use,
            pieces.map(({ recordId }) => recordId),
          ),
        );
        continue;
      }
      const gathered = new Gathered<Piece>();
      for (const piece of pieces) gathered.add(`mounting:${part.id}`, this.groupOf(piece.recordId), piece);
      this.put('mounting', { name: part.item.name, itemId: part.id }, gathered);
    }
  }

  private hubs(): void {
    const hubs = [...recordsOf(this.doc, 'junction')].filter(({ style }) => style === 'hub');
    this.putByItem(
      'hubs',
      hubs,
      ({ itemId }) => itemId,
      (hub) => ({ recordId: hub.id, label: labelOf(hub, this.doc), count: 1 }),
    );
    const bare = hubs.filter(({ itemId }) => !itemIdentity(this.doc, itemId));
    if (bare.length > 0)
      this.warnings.push(
        warningOf(
          'no-part',
          `${counted(bare.length, 'hub')} on the plan ${bare.length === 1 ? 'has' : 'have'} no item from the catalogue, so ${bare.length === 1 ? 'it is' : 'they are'} not on the bill.`,
          bare.map(({ id }) => id),
        ),
      );
  }

  private transformers(): void {
    const { catalogue, book, pricing } = this.input;
    this.putByItem(
      'transformers',
      recordsOf(this.doc, 'transformer'),
      ({ itemId }) => itemId,
      (t) => ({ recordId: t.id, label: labelOf(t, this.doc), count: 1 }),
    );
    const byControl = new Map<
      string,
      { category: CatalogueCategory; name: string; pieces: Gathered<Piece> }
    >();
    for (const t of recordsOf(this.doc, 'transformer')) {
      const label = labelOf(t, this.doc);
      const chosen = Object.hasOwn(pricing.controls, t.id) ? pricing.controls[t.id] : book.controlItemId;
      const item = chosen ? catalogue.get(chosen) : undefined;
      if (!chosen || item?.category !== 'control') {
        const decided = Object.hasOwn(pricing.controls, t.id) && chosen === null;
        if (!decided)
          this.warnings.push(warningOf('no-control', `No control is chosen for ${label}.`, [t.id]));
        continue;
      }
      const entry = byControl.get(chosen) ?? {
        category: item.category,
        name: item.name,
        pieces: new Gathered<Piece>(),
      };
      byControl.set(chosen, entry);
      entry.pieces.add(`controls:${chosen}`, null, { recordId: t.id, label, count: 1 });
    }
    for (const [id, { name, pieces }] of byControl)
      this.put(
        'controls',
        { name, itemId: id },
        pieces,
        (list) => `For ${labelsInWords(list.map((p) => p.label))}`,
      );
  }

  private nameOf(recordId: string): string {
    const record = this.doc.get(recordId);
    return record ? labelOf(record, this.doc) : recordId;
  }
}
