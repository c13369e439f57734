import { sameData } from '@lampwright/geometry/plan';
import { emptyPricing, type JobPricing } from '@lampwright/geometry/price';
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Edit } from './edits';
import type { Keeper } from './kept';
import { type ClashPart, clashKey, rebase, type Side } from './rebase';

export interface Versioned {
  readonly version: number;
  readonly pricing: JobPricing;
}

/** What became of a save. */
export type SaveAnswer =
  | { readonly is: 'saved'; readonly at: Versioned }
  | { readonly is: 'conflict' }
  /** It may go through later by itself. */
  | { readonly is: 'waiting'; readonly message: string }
  /** It will not go through as it is. */
  | { readonly is: 'refused'; readonly message: string };

export interface PricingPort {
  load(): Promise<Versioned>;
  save(baseVersion: number, pricing: JobPricing): Promise<SaveAnswer>;
}

export interface Clock {
  /** Calls back after so many milliseconds; returns how to call it off. */
  after(ms: number, call: () => void): () => void;
}

export type SaveState =
  | { readonly is: 'saved' }
  | { readonly is: 'saving' }
  | { readonly is: 'waiting'; readonly message: string }
  | { readonly is: 'refused'; readonly message: string }
  | { readonly is: 'choosing' };

export interface Clash {
  readonly theirs: Versioned;
  readonly parts: readonly ClashPart[];
}

export interface PricingState {
  readonly phase: 'loading' | 'failed' | 'ready';
  readonly failure: unknown;
  /** As it is here, edits included that the server has not got. */
  readonly pricing: JobPricing;
  /** As the server has it. */
  readonly base: Versioned;
  readonly unsent: number;
  readonly save: SaveState;
  readonly clash: Clash | null;
  readonly notes: readonly string[];
  readonly undoLabel: string | null;
  readonly redoLabel: string | null;
}

interface Step {
  readonly label: string;
  readonly before: JobPricing;
  readonly after: JobPricing;
}

/** Edits within so short a time go to the server together. */
const TOGETHER_MS = 500;
const RETRY_MS = [2_000, 5_000, 15_000, 30_000] as const;
const MOST_STEPS = 100;

/**
 * A job's pricing while somebody edits it: every edit shows at once, is kept in the browser, and goes to the
 * server by itself, one save at a time, each on top of the version it was made from.
 */
export class PricingStore {
  readonly state: StoreApi<PricingState> = createStore<PricingState>(() => ({
    phase: 'loading',
    failure: null,
    pricing: emptyPricing,
    base: { version: 0, pricing: emptyPricing },
    unsent: 0,
    save: { is: 'saved' },
    clash: null,
    notes: [],
    undoLabel: null,
    redoLabel: null,
  }));
  private undoSteps: Step[] = [];
  private redoSteps: Step[] = [];
  private sending = false;
  private stopped = false;
  private failures = 0;
  private callOff: (() => void) | null = null;

  constructor(
    private readonly port: PricingPort,
    private readonly keeper: Keeper,
    private readonly clock: Clock,
    /** The server has another version than before. */
    private readonly onSaved: (at: Versioned) => void = () => {},
  ) {}

  /** Reads the pricing, and takes up the edits that an earlier visit left unsent. */
  async start(): Promise<void> {
    this.set({ phase: 'loading', failure: null });
    try {
      const base = await this.port.load();
      if (this.stopped) return;
      const kept = this.keeper.read();
      this.set({ phase: 'ready', base, pricing: base.pricing });
      if (kept === null) return;
      if (kept.baseVersion === base.version) this.set({ pricing: kept.mine, unsent: kept.unsent });
      else {
        this.set({
          base: { version: kept.baseVersion, pricing: kept.base },
          pricing: kept.mine,
          unsent: kept.unsent,
        });
        this.meet(base);
      }
      this.soon(0);
    } catch (failure) {
      if (!this.stopped) this.set({ phase: 'failed', failure });
    }
  }

  edit(label: string, edit: Edit): void {
    const { pricing: before, phase } = this.state.getState();
    if (phase !== 'ready') return;
    const after = edit(before);
    if (sameData(before, after)) return;
    this.undoSteps = [...this.undoSteps, { label, before, after }].slice(-MOST_STEPS);
    this.redoSteps = [];
    this.become(after);
  }

  undo(): void {
    const step = this.undoSteps.pop();
    if (!step) return;
    this.redoSteps.push(step);
    this.become(this.moved(step.after, step.before));
  }

  redo(): void {
    const step = this.redoSteps.pop();
    if (!step) return;
    this.undoSteps.push(step);
    this.become(this.moved(step.before, step.after));
  }

  /** A step made on the present: what changed since otherwise is left as it is, and told. */
  private moved(from: JobPricing, to: JobPricing): JobPricing {
    const { pricing } = this.state.getState();
    const { pricing: next, clashes } = rebase(from, to, pricing);
    if (clashes.length > 0)
      this.set({
        notes: [
          clashes.length === 1
            ? 'One thing was changed since, and left as it is.'
            : `${clashes.length} things were changed since, and left as they are.`,
        ],
      });
    return next;
  }

  /** Takes one side for everything that both changed. */
  settle(sideOf: (part: ClashPart) => Side): void {
    const { clash, base, pricing } = this.state.getState();
    if (clash === null) return;
    const sides = new Map(clash.parts.map((part) => [clashKey(part), sideOf(part)]));
    const merged = rebase(
      base.pricing,
      pricing,
      clash.theirs.pricing,
      (part) => sides.get(clashKey(part)) ?? 'mine',
    );
    this.set({ clash: null, base: clash.theirs, notes: merged.notes, save: { is: 'saved' } });
    this.onSaved(clash.theirs);
    this.become(merged.pricing);
  }

  /** Hears that the server may have a newer version, and reads it. */
  async refresh(): Promise<void> {
    const { phase, clash } = this.state.getState();
    if (phase !== 'ready' || clash !== null || this.sending) return;
    try {
      const present = await this.port.load();
      if (!this.stopped && !this.sending && present.version > this.state.getState().base.version) {
        this.meet(present);
        this.soon(0);
      }
    } catch {
      // Nothing depends on it: the next save meets the newer version all the same.
    }
  }

  /** Tries again at once what waits. */
  retry(): void {
    this.failures = 0;
    this.soon(0);
  }

  forgetNotes(): void {
    this.set({ notes: [] });
  }

  /** The page goes: what is unsent is sent at once, and is kept in the browser until the server has it. */
  stop(): void {
    this.callOff?.();
    if (this.state.getState().unsent > 0) void this.send();
    this.stopped = true;
  }

  private become(pricing: JobPricing): void {
    const { base, unsent } = this.state.getState();
    this.set({ pricing, unsent: sameData(pricing, base.pricing) ? 0 : unsent + 1 });
    this.keep();
    this.soon(TOGETHER_MS);
  }

  private keep(): void {
    const { base, pricing, unsent } = this.state.getState();
    this.keeper.write(
      unsent === 0 ? null : { baseVersion: base.version, base: base.pricing, mine: pricing, unsent },
    );
  }

  private soon(ms: number): void {
    this.callOff?.();
    this.callOff = this.clock.after(ms, () => {
      this.callOff = null;
      void this.send();
    });
  }

  private async send(): Promise<void> {
    const { base, pricing, unsent, clash } = this.state.getState();
    if (this.sending || this.stopped || clash !== null) return;
    if (unsent === 0) return this.set({ save: { is: 'saved' } });
    this.sending = true;
    this.set({ save: { is: 'saving' } });
    const answer = await this.port.save(base.version, pricing);
    this.sending = false;
    // The page may be gone: what the server took is then no longer kept as unsent.
    switch (answer.is) {
      case 'saved':
        return this.saved(answer.at, pricing, unsent);
      case 'conflict':
        return this.conflicted();
      case 'waiting': {
        this.set({ save: { is: 'waiting', message: answer.message } });
        if (!this.stopped) this.soon(RETRY_MS[Math.min(this.failures++, RETRY_MS.length - 1)] ?? 30_000);
        return;
      }
      case 'refused': {
        this.set({ save: { is: 'refused', message: answer.message } });
        // Something else was written meanwhile: that may be right.
        if (this.state.getState().pricing !== pricing) this.soon(TOGETHER_MS);
        return;
      }
    }
  }

  private saved(at: Versioned, sent: JobPricing, sentEdits: number): void {
    this.failures = 0;
    const { pricing, unsent } = this.state.getState();
    const mine = pricing === sent ? at.pricing : rebase(sent, pricing, at.pricing, () => 'mine').pricing;
    const left = sameData(mine, at.pricing) ? 0 : Math.max(1, unsent - sentEdits);
    this.set({
      base: at,
      pricing: mine,
      unsent: left,
      save: left === 0 ? { is: 'saved' } : { is: 'saving' },
    });
    this.keep();
    this.onSaved(at);
    if (left > 0 && !this.stopped) this.soon(0);
  }

  private async conflicted(): Promise<void> {
    try {
      const present = await this.port.load();
      if (this.stopped) return;
      this.meet(present);
      this.soon(0);
    } catch {
      this.set({ save: { is: 'waiting', message: 'Somebody else changed the price meanwhile.' } });
      if (!this.stopped) this.soon(RETRY_MS[Math.min(this.failures++, RETRY_MS.length - 1)] ?? 30_000);
    }
  }

  /** Puts the edits of this window on top of a newer version, or asks where both changed the same. */
  private meet(theirs: Versioned): void {
    const { base, pricing, unsent } = this.state.getState();
    if (unsent === 0) {
      this.set({ base: theirs, pricing: theirs.pricing });
      this.onSaved(theirs);
      return;
    }
    const merged = rebase(base.pricing, pricing, theirs.pricing);
    if (merged.clashes.length > 0) {
      this.set({ clash: { theirs, parts: merged.clashes }, save: { is: 'choosing' } });
      return;
    }
    const left = sameData(merged.pricing, theirs.pricing) ? 0 : unsent;
    this.set({ base: theirs, pricing: merged.pricing, unsent: left, notes: merged.notes });
    this.keep();
    this.onSaved(theirs);
  }

  private set(change: Partial<PricingState>): void {
    this.state.setState({
      ...change,
      undoLabel: this.undoSteps.at(-1)?.label ?? null,
      redoLabel: this.redoSteps.at(-1)?.label ?? null,
    });
  }
}
