import { type Camera, type Point, toSheet } from '../../../plan-view/camera';
import type { Modifiers, ToolEvent } from '../tools/tool';

/** What pointers act on. Points of `tool` events are in sheet pixels; the rest is in window pixels. */
export interface InputTarget {
  camera(): Camera;
  tool(event: ToolEvent): void;
  touchDrag(at: Point): 'draw' | 'pan';
  pan(dx: number, dy: number): void;
  zoom(factor: number, anchor: Point): void;
  /** Viewers pan; nothing they do reaches a tool but choosing. */
  readOnly(): boolean;
  panning(active: boolean): void;
}

export interface PointerSample {
  readonly id: number;
  readonly type: 'mouse' | 'pen' | 'touch';
  readonly at: Point;
  /** 0 main, 1 middle, 2 other; as in PointerEvent. */
  readonly button: number;
  readonly mods: Modifiers;
  readonly time: number;
}

/** A finger that moves less than this, in window pixels, taps. */
const TAP_SLOP = 9;
const DOUBLE_TIME_MS = 400;
const DOUBLE_SLOP = 12;

type Gesture =
  | { readonly is: 'none' }
  | { readonly is: 'tool'; readonly id: number }
  /** A finger that may yet tap; nothing has reached the tool. */
  | { readonly is: 'finger'; readonly id: number; readonly start: PointerSample }
  | { readonly is: 'pan'; readonly id: number; readonly last: Point; readonly start: Point }
  | { readonly is: 'pinch' }
  /** A finger left over from a pinch: it does nothing till it is lifted. */
  | { readonly is: 'spent' };

/**
 * Turns pointers into tool events and moves of the view. Two fingers never draw: the second one ends what the
 * first began and the two pan and zoom. Where a pen is in use, touch only pans. A cancelled pointer discards
 * the gesture.
 */
export class PointerInput {
  private gesture: Gesture = { is: 'none' };
  private readonly touches = new Map<number, Point>();
  private penSeen = false;
  private spaceHeld = false;
  private lastTap: { readonly at: Point; readonly time: number } | null = null;

  constructor(private readonly target: InputTarget) {}

  space(held: boolean): void {
    this.spaceHeld = held;
    this.target.panning(held || this.gesture.is === 'pan');
  }

  down(p: PointerSample): void {
    if (p.type === 'pen') this.penSeen = true;
    if (p.type === 'touch') {
      this.touches.set(p.id, p.at);
      if (this.touches.size >= 2) {
        if (this.gesture.is === 'tool') this.target.tool({ type: 'cancel' });
        this.begin({ is: 'pinch' });
        return;
      }
    }
    if (this.gesture.is !== 'none') return;
    if (p.button === 1 || this.spaceHeld) {
      this.begin({ is: 'pan', id: p.id, last: p.at, start: p.at });
      return;
    }
    if (p.button !== 0) return;
    if (p.type === 'touch') {
      const draws =
        !this.penSeen && !this.target.readOnly() && this.target.touchDrag(this.sheet(p.at)) === 'draw';
      if (!draws) {
        this.begin({ is: 'finger', id: p.id, start: p });
        return;
      }
    }
    if (this.target.readOnly()) {
      this.begin({ is: 'pan', id: p.id, last: p.at, start: p.at });
      return;
    }
    this.begin({ is: 'tool', id: p.id });
    this.target.tool({ type: 'down', at: this.sheet(p.at), mods: p.mods });
  }

  move(p: PointerSample): void {
    const before = this.touches.get(p.id);
    switch (this.gesture.is) {
      case 'pinch':
        if (before !== undefined) this.pinch(p, before);
        break;
      case 'pan':
        if (p.id !== this.gesture.id) break;
        this.target.pan(p.at.x - this.gesture.last.x, p.at.y - this.gesture.last.y);
        this.gesture = { ...this.gesture, last: p.at };
        break;
      case 'finger':
        if (p.id === this.gesture.id && far(p.at, this.gesture.start.at, TAP_SLOP)) {
          const { start } = this.gesture;
          this.begin({ is: 'pan', id: p.id, last: p.at, start: start.at });
          this.target.pan(p.at.x - start.at.x, p.at.y - start.at.y);
        }
        break;
      case 'tool':
        if (p.id === this.gesture.id) this.target.tool({ type: 'move', at: this.sheet(p.at), mods: p.mods });
        break;
      case 'none':
        if (p.type !== 'touch') this.target.tool({ type: 'move', at: this.sheet(p.at), mods: p.mods });
        break;
      case 'spent':
        break;
    }
    if (before !== undefined) this.touches.set(p.id, p.at);
  }

  up(p: PointerSample): void {
    this.touches.delete(p.id);
    const { gesture } = this;
    switch (gesture.is) {
      case 'tool':
        if (p.id !== gesture.id) return;
        this.begin({ is: 'none' });
        this.target.tool({ type: 'up', at: this.sheet(p.at), mods: p.mods });
        this.tapped(p);
        return;
      case 'finger':
        if (p.id !== gesture.id) return;
        this.begin({ is: 'none' });
        this.tap(p);
        return;
      case 'pan':
        if (p.id !== gesture.id) return;
        this.begin({ is: 'none' });
        // A viewer's click that went nowhere chooses.
        if (this.target.readOnly() && p.button === 0 && !far(p.at, gesture.start, TAP_SLOP)) this.tap(p);
        return;
      case 'pinch':
      case 'spent':
        this.begin(this.touches.size === 0 ? { is: 'none' } : { is: 'spent' });
        return;
      case 'none':
        return;
    }
  }

  cancel(id: number): void {
    this.touches.delete(id);
    const { gesture } = this;
    if (gesture.is === 'tool' && gesture.id === id) this.target.tool({ type: 'cancel' });
    const mine =
      gesture.is === 'tool' || gesture.is === 'pan' || gesture.is === 'finger'
        ? gesture.id === id
        : this.touches.size === 0;
    if (mine) this.begin({ is: 'none' });
  }

  leave(): void {
    if (this.gesture.is === 'none') this.target.tool({ type: 'leave' });
  }

  private tap(p: PointerSample): void {
    const at = this.sheet(p.at);
    this.target.tool({ type: 'down', at, mods: p.mods });
    this.target.tool({ type: 'up', at, mods: p.mods });
    if (p.type === 'touch') this.target.tool({ type: 'leave' });
    this.tapped(p);
  }

  private tapped(p: PointerSample): void {
    const last = this.lastTap;
    if (last !== null && p.time - last.time < DOUBLE_TIME_MS && !far(p.at, last.at, DOUBLE_SLOP)) {
      this.lastTap = null;
      this.target.tool({ type: 'double', at: this.sheet(p.at) });
    } else this.lastTap = { at: p.at, time: p.time };
  }

  private pinch(p: PointerSample, before: Point): void {
    const other = [...this.touches].find(([id]) => id !== p.id)?.[1];
    if (other === undefined) return;
    const was = Math.hypot(before.x - other.x, before.y - other.y);
    const is = Math.hypot(p.at.x - other.x, p.at.y - other.y);
    this.target.pan((p.at.x - before.x) / 2, (p.at.y - before.y) / 2);
    if (was > 0 && is > 0)
      this.target.zoom(is / was, { x: (p.at.x + other.x) / 2, y: (p.at.y + other.y) / 2 });
  }

  private begin(gesture: Gesture): void {
    this.gesture = gesture;
    this.target.panning(this.spaceHeld || gesture.is === 'pan');
  }

  private sheet(p: Point): Point {
    return toSheet(this.target.camera(), p);
  }
}

function far(a: Point, b: Point, reach: number): boolean {
  return Math.hypot(a.x - b.x, a.y - b.y) > reach;
}

export interface WheelSample {
  readonly deltaX: number;
  readonly deltaY: number;
  /** 0 pixels, 1 lines, 2 pages; as in WheelEvent. */
  readonly deltaMode: number;
  readonly ctrl: boolean;
  readonly shift: boolean;
}

/** Pixels of a line of a wheel that counts in lines. */
const LINE_PX = 16;
/** A notch of a wheel is at least so many pixels, and goes only up and down; a trackpad's moves are finer. */
const NOTCH_PX = 50;

/** What a wheel event asks for: pinching and a mouse's wheel zoom, two fingers on a trackpad pan. */
export function readWheel(
  e: WheelSample,
): { readonly zoom: number } | { readonly dx: number; readonly dy: number } {
  const scale = e.deltaMode === 0 ? 1 : e.deltaMode === 1 ? LINE_PX : LINE_PX * 20;
  const dx = e.deltaX * scale;
  const dy = e.deltaY * scale;
  if (e.ctrl) return { zoom: Math.exp(-clamp(dy, 50) * 0.01) };
  if (e.shift) return { dx: -(dx === 0 ? dy : dx), dy: 0 };
  const wheel = e.deltaMode !== 0 || (dx === 0 && Number.isInteger(e.deltaY) && Math.abs(dy) >= NOTCH_PX);
  if (wheel) return { zoom: Math.exp(-clamp(dy, 240) * 0.0016) };
  return { dx: -dx, dy: -dy };
}

function clamp(n: number, most: number): number {
  return Math.min(most, Math.max(-most, n));
}
