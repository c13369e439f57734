import { scaleOfSheet } from '@lampwright/geometry/estimate';
import {
  deleteRecords,
  duplicate,
  type EditResult,
  isNode,
  moveRecords,
  type PlanDocument,
  recordOf,
  recordsOf,
} from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { StoreApi } from 'zustand/vanilla';
import { markRadius } from '../../../plan-view/camera';
import { CameraStore } from '../canvas/camera-store';
import { EstimateController, type EstimateDeps } from '../estimate/controller';
import { createSession, type SessionState } from '../store/session';
import { boxOfRecords, extentOf } from '../tools/hit';
import { ToolHost } from '../tools/host';
import { settle, type ToolContext, type ToolId } from '../tools/tool';
import type { CatalogueEntry } from './items';
import type { PlanPort } from './plan-port';

/** How far a copy stands from what it is a copy of, in window pixels. */
const COPY_OFFSET = 28;

/** The plan page at work: the plan, the view, the choice, the tool and the volts, without any React. */
export class PlanEditor {
  readonly camera = new CameraStore();
  readonly session: StoreApi<SessionState>;
  readonly estimate: EstimateController;
  readonly tools: ToolHost;
  /** The company's catalogue, as far as it has come. */
  entries: readonly CatalogueEntry[] = [];
  private readonly undoers: (() => void)[] = [];
  private readonly context: ToolContext;

  constructor(
    readonly plan: PlanPort,
    readonly canEdit: boolean,
    sheetId: string,
    deps: EstimateDeps,
  ) {
    this.session = createSession(sheetId);
    this.estimate = new EstimateController(deps);
    this.context = {
      doc: () => this.doc,
      sheetId: () => this.session.getState().sheetId,
      scale: () => this.scale,
      zoom: () => this.camera.camera.zoom,
      markRadius: () => markRadius(this.camera.camera),
      choices: () => this.session.getState().choices,
      selection: () => this.session.getState().selection,
      select: (ids) => this.select(ids),
      hover: (id) => this.hover(id),
      commit: (change, label) => this.plan.commit(change, label),
      request: (request) => this.session.setState({ request }),
      say: (message) => this.session.setState({ message }),
      changed: () => {},
    };
    this.tools = new ToolHost(this.context);
    this.estimate.follow(this.doc);
    this.undoers.push(
      plan.state.subscribe((state, before) => {
        if (state.doc === before.doc) return;
        this.forgetRemoved();
        this.estimate.follow(state.doc);
        this.tools.refresh();
      }),
    );
  }

  get doc(): PlanDocument {
    return this.plan.state.getState().doc;
  }

  get scale(): SolvedScale | null {
    const sheet = recordOf(this.doc, this.session.getState().sheetId, 'sheet');
    const result = sheet === undefined ? null : scaleOfSheet(sheet);
    return result?.ok ? result.scale : null;
  }

  select(ids: Iterable<string>): void {
    this.session.setState({ selection: new Set(ids), message: null });
  }

  hover(id: string | null): void {
    if (this.session.getState().hoveredId !== id) this.session.setState({ hoveredId: id });
  }

  /** Chooses a record from outside of the drawing and brings it into view, on its own sheet. */
  reveal(id: string, add = false): void {
    const record = this.doc.get(id);
    if (record === undefined) return;
    if ('sheetId' in record) this.openSheet(record.sheetId);
    const { selection } = this.session.getState();
    this.select(add ? [...selection, id] : [id]);
    const extent = extentOf(this.context, record);
    const middle = extent[Math.floor(extent.length / 2)];
    if (middle !== undefined) this.camera.reveal(middle);
  }

  /** Begins with these chosen and in view, on the sheet that has most of them. What is gone is told. */
  light(ids: readonly string[]): void {
    if (ids.length === 0) return;
    const there = ids.filter((id) => this.doc.has(id));
    const sheetId = this.sheetOfMost(there);
    if (sheetId !== null) this.openSheet(sheetId);
    this.select(there);
    this.camera.aimAt(
      boxOfRecords(
        this.context,
        there.filter((id) => this.isOn(id, sheetId)),
      ),
    );
    const gone = ids.length - there.length;
    if (gone > 0)
      this.session.setState({
        message:
          there.length === 0
            ? 'That is no longer on the plan.'
            : `${gone} of these are no longer on the plan.`,
      });
  }

  private isOn(id: string, sheetId: string | null): boolean {
    const record = this.doc.get(id);
    return record !== undefined && 'sheetId' in record && record.sheetId === sheetId;
  }

  private sheetOfMost(ids: readonly string[]): string | null {
    const counts = new Map<string, number>();
    for (const id of ids) {
      const record = this.doc.get(id);
      if (record !== undefined && 'sheetId' in record)
        counts.set(record.sheetId, (counts.get(record.sheetId) ?? 0) + 1);
    }
    return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? null;
  }

  openSheet(sheetId: string): void {
    if (sheetId === this.session.getState().sheetId) return;
    this.camera.aimAt(null);
    this.tools.use('select');
    this.session.setState({ sheetId, hoveredId: null, request: null, message: null });
  }

  use(tool: ToolId): void {
    if (!this.canEdit && tool !== 'select') return;
    this.tools.use(tool);
    if (tool === 'scale') this.chooseReference();
    this.session.setState({
      message: null,
      request: null,
      panel:
        tool === 'scale'
          ? 'scale'
          : this.session.getState().panel === 'scale'
            ? 'none'
            : this.session.getState().panel,
    });
  }

  /** A photo needs a rectangle before a length says anything; a plan only takes lengths. */
  private chooseReference(): void {
    const sheet = recordOf(this.doc, this.session.getState().sheetId, 'sheet');
    const hasRectangle = sheet?.references.some((r) => r.kind === 'rectangle') ?? false;
    const reference = sheet?.view === 'photo' && !hasRectangle ? 'rectangle' : 'length';
    this.session.setState({ choices: { ...this.session.getState().choices, reference } });
  }

  /** Tries an edit: commits it, or says why not; a loop or a join is asked about first. */
  edit(
    label: string,
    attempt: (doc: PlanDocument, markedToMarked: boolean) => EditResult,
    keepSelection = true,
  ): boolean {
    if (!this.canEdit) return false;
    return settle(
      this.context,
      label,
      (marked) => attempt(this.doc, marked),
      keepSelection ? () => {} : undefined,
    );
  }

  deleteSelection(): void {
    const { selection } = this.session.getState();
    if (selection.size === 0) return;
    this.edit(selection.size === 1 ? 'Delete' : `Delete ${selection.size}`, (doc) =>
      deleteRecords(doc, selection),
    );
  }

  duplicateSelection(): void {
    const { selection } = this.session.getState();
    if (selection.size === 0) return;
    const step = COPY_OFFSET / this.camera.camera.zoom;
    this.edit('Duplicate', (doc) => duplicate(doc, selection, { dx: step, dy: step }), false);
  }

  /** Moves the choice by window pixels: the way to move without dragging. */
  nudge(dx: number, dy: number): void {
    const { selection } = this.session.getState();
    if (selection.size === 0) return;
    const { zoom } = this.camera.camera;
    this.edit('Move', (doc) => moveRecords(doc, selection, dx / zoom, dy / zoom));
  }

  selectAll(): void {
    const { sheetId } = this.session.getState();
    const ids: string[] = [];
    for (const record of this.doc.values())
      if ('sheetId' in record && record.sheetId === sheetId && record.kind !== 'area') ids.push(record.id);
    this.select(ids);
  }

  zoomToSelection(): void {
    const { selection } = this.session.getState();
    const box = boxOfRecords(this.context, selection.size > 0 ? selection : this.onSheet());
    if (box !== null) this.camera.fitTo(box);
    else this.camera.fit();
  }

  undo(): void {
    if (this.canEdit) this.tellKept(this.plan.undo());
  }

  redo(): void {
    if (this.canEdit) this.tellKept(this.plan.redo());
  }

  private tellKept(kept: readonly string[] | null): void {
    if (kept === null || kept.length === 0) return;
    const what = kept.length === 1 ? 'One thing was' : `${kept.length} things were`;
    this.session.setState({ message: `${what} changed by somebody else since, and left as it is.` });
  }

  close(): void {
    for (const undo of this.undoers) undo();
    this.estimate.close();
    this.plan.close();
  }

  private onSheet(): string[] {
    const { sheetId } = this.session.getState();
    return [...this.doc.values()].filter((r) => isNode(r) && r.sheetId === sheetId).map((r) => r.id);
  }

  /** What is gone from the plan can't be chosen or hovered; a sheet that is gone gives way to the first. */
  private forgetRemoved(): void {
    const { selection, hoveredId, sheetId } = this.session.getState();
    const next = [...selection].filter((id) => this.doc.has(id));
    if (next.length !== selection.size) this.session.setState({ selection: new Set(next) });
    if (hoveredId !== null && !this.doc.has(hoveredId)) this.session.setState({ hoveredId: null });
    if (recordOf(this.doc, sheetId, 'sheet') === undefined) {
      const first = [...recordsOf(this.doc, 'sheet')].sort((a, b) => a.order - b.order)[0];
      if (first !== undefined) this.openSheet(first.id);
    }
  }
}
