import type { Aim, Change, EditResult, ItemChoice, PlanDocument } from '@lampwright/geometry/plan';
import type { SolvedScale } from '@lampwright/geometry/sheet';
import type { Point } from '../../../plan-view/camera';
import type { ProposedPreview } from './proposed';

/**
 * A tool is a small state machine between gestures and the plan. It hears typed events in sheet pixels,
 * shows a preview, and ends each gesture as one change. It knows no React, no canvas and no DOM.
 */
export interface Tool {
  readonly id: ToolId;
  /** Makes one step of the machine. Says whether the event meant anything to it. */
  handle(event: ToolEvent): boolean;
  /** What to show over the plan while the gesture runs; null when there is nothing. */
  preview(): Preview | null;
  /** Leaves the tool: whatever is unfinished is given up. */
  exit(): void;
  /** What one finger that moves here does; a tap always reaches the tool. */
  touchDrag(at: Point): 'draw' | 'pan';
}

export const toolIds = [
  'select',
  'transformer',
  'fixture',
  'cable',
  'hub',
  'aim',
  'area',
  'face',
  'tree',
  'measure',
  'note',
  'scale',
] as const;
export type ToolId = (typeof toolIds)[number];

export interface Modifiers {
  readonly shift: boolean;
  readonly alt: boolean;
}

export type ToolEvent =
  | { readonly type: 'down'; readonly at: Point; readonly mods: Modifiers }
  | { readonly type: 'move'; readonly at: Point; readonly mods: Modifiers }
  | { readonly type: 'up'; readonly at: Point; readonly mods: Modifiers }
  | { readonly type: 'double'; readonly at: Point }
  | { readonly type: 'leave' }
  | { readonly type: 'key'; readonly key: string; readonly mods: Modifiers }
  /** A typed segment: metres on the ground, and degrees counter-clockwise from the sheet's right, or the pointer's way. */
  | { readonly type: 'typed'; readonly meters: number; readonly degrees: number | null }
  /** The gesture is over without an outcome: pointercancel, a second finger, the window lost. */
  | { readonly type: 'cancel' };

export type Preview =
  | { readonly kind: 'move'; readonly ids: ReadonlySet<string>; readonly dx: number; readonly dy: number }
  | { readonly kind: 'shape'; readonly id: string; readonly points: readonly Point[] }
  | { readonly kind: 'box'; readonly a: Point; readonly b: Point }
  | {
      readonly kind: 'cable';
      readonly points: readonly Point[];
      readonly pending: Point | null;
      readonly snap: Point | null;
    }
  | { readonly kind: 'polygon'; readonly points: readonly Point[]; readonly pending: Point | null }
  | { readonly kind: 'polyline'; readonly points: readonly Point[]; readonly pending: Point | null }
  /** A wall face: its foot so far, and its upper edge once it is known. */
  | {
      readonly kind: 'face';
      readonly foot: readonly Point[];
      readonly top: readonly Point[] | null;
      readonly pending: Point | null;
      /** The foot is whole, and the click on the upper edge is waited for. */
      readonly waitsForTop: boolean;
    }
  /** A tree or shrub: where it stands, and its crown so far. */
  | {
      readonly kind: 'tree';
      readonly foot: Point;
      readonly outline: readonly Point[];
      readonly pending: Point | null;
    }
  /** Lights being aimed: which, and what at; null while the pointer is on nothing that can be lit. */
  | { readonly kind: 'aim'; readonly aims: ReadonlyMap<string, Aim>; readonly at: Point }
  | ProposedPreview
  | { readonly kind: 'place'; readonly at: Point; readonly mark: PlaceMark; readonly snapped: boolean }
  | {
      readonly kind: 'scale';
      readonly shape: 'length' | 'rectangle';
      readonly points: readonly Point[];
      readonly pending: Point | null;
    };

export type PlaceMark =
  | { readonly kind: 'transformer' | 'hub' | 'splice' | 'note' }
  | { readonly kind: 'fixture'; readonly initial: string };

/** What placing tools put down; null while the person has chosen nothing. */
export interface Choices {
  readonly fixture: {
    readonly item: ItemChoice;
    readonly lamp: ItemChoice | null;
    readonly initial: string;
  } | null;
  readonly transformer:
    | { readonly kind: 'new'; readonly item: ItemChoice }
    /** The feed of a transformer that stands on another sheet. */
    | { readonly kind: 'feed'; readonly transformerId: string }
    | null;
  readonly cable: ItemChoice | null;
  readonly junction: 'hub' | 'splice';
  readonly reference: 'length' | 'rectangle';
}

/** What a finished area, note or scale reference needs from the person before it becomes part of the plan. */
export type Request =
  | { readonly kind: 'area'; readonly points: readonly Point[] }
  | {
      readonly kind: 'face';
      readonly foot: readonly Point[];
      readonly top: readonly Point[] | null;
      /** How high the photo's camera sees it. */
      readonly seenMeters: number | null;
    }
  | {
      readonly kind: 'tree';
      readonly foot: Point;
      readonly outline: readonly Point[];
      readonly seen: { readonly heightMeters: number; readonly crownBaseMeters: number } | null;
    }
  | { readonly kind: 'note'; readonly at: Point }
  | { readonly kind: 'scale-length'; readonly a: Point; readonly b: Point }
  | { readonly kind: 'scale-rectangle'; readonly corners: readonly [Point, Point, Point, Point] }
  | { readonly kind: 'confirm'; readonly message: string; readonly proceed: () => void };

/** The world of a tool: the plan, the view, and the ways to change them. */
export interface ToolContext {
  doc(): PlanDocument;
  sheetId(): string;
  scale(): SolvedScale | null;
  /** Window pixels for one sheet pixel: hits and snaps are judged on the screen. */
  zoom(): number;
  /** Half the width of a mark in window pixels. */
  markRadius(): number;
  choices(): Choices;
  selection(): ReadonlySet<string>;
  select(ids: Iterable<string>): void;
  hover(id: string | null): void;
  commit(change: Change, label: string): void;
  /** Asks the person; the gesture's outcome waits for the answer. */
  request(request: Request): void;
  /** A sentence for the person: why something was refused, or worth knowing. */
  say(message: string): void;
  /** The preview changed. */
  changed(): void;
}

/** Commits an edit, or says why not. A loop or a join is asked about first, then tried again confirmed. */
export function settle(
  ctx: ToolContext,
  label: string,
  attempt: (markedToMarked: boolean) => EditResult,
  done: (selected: readonly string[]) => void = (selected) => ctx.select(selected),
): boolean {
  const finish = (result: EditResult): boolean => {
    switch (result.kind) {
      case 'change':
        ctx.commit(result.change, label);
        for (const note of result.notes) ctx.say(note);
        done(result.selected);
        return true;
      case 'refused':
        ctx.say(result.message);
        return false;
      case 'confirm':
        ctx.request({
          kind: 'confirm',
          message: result.message,
          proceed: () => finish(attempt(true)),
        });
        return false;
    }
  };
  return finish(attempt(false));
}

export function distance(a: Point, b: Point): number {
  return Math.hypot(a.x - b.x, a.y - b.y);
}
