import { type IdSource, newId, recordOf } from '../build.js';
import { type Change, changeTo } from '../change.js';
import type { PlanDocument, PlanRecord, RecordKind, RecordOf } from '../records.js';

/**
 * A plan being edited by one operation: reads see what was put, nothing else does. Ends as one change that
 * holds only what really differs.
 */
export class Draft {
  readonly #doc: PlanDocument;
  readonly #edited: Map<string, PlanRecord>;
  readonly #touched = new Set<string>();

  constructor(
    doc: PlanDocument,
    readonly ids: IdSource = newId,
  ) {
    this.#doc = doc;
    this.#edited = new Map(doc);
  }

  /** The plan as edited so far. A live view: read it, don't keep it. */
  get plan(): PlanDocument {
    return this.#edited;
  }

  /** The plan before the operation. */
  get before(): PlanDocument {
    return this.#doc;
  }

  get(id: string | null): PlanRecord | undefined {
    return id === null ? undefined : this.#edited.get(id);
  }

  of<K extends RecordKind>(id: string | null, kind: K): RecordOf<K> | undefined {
    return recordOf(this.#edited, id, kind);
  }

  put<R extends PlanRecord>(record: R): R {
    this.#edited.set(record.id, record);
    this.#touched.add(record.id);
    return record;
  }

  remove(id: string): void {
    this.#edited.delete(id);
    this.#touched.add(id);
  }

  change(): Change {
    return changeTo(
      this.#doc,
      [...this.#touched].map((id) => [id, this.#edited.get(id)] as const),
      this.ids(),
    );
  }
}
