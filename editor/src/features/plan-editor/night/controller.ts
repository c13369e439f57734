import { scaleOfSheet } from '@lampwright/geometry/estimate';
import {
  type ControlZone,
  controlZonesOf,
  type EveningPlace,
  type LuxUnit,
  type NightNote,
  type NightScene,
  nightSceneOf,
  sceneWithNotes,
} from '@lampwright/geometry/light';
import {
  type Evening,
  eveningOf,
  type LightMap,
  type Look,
  lookAt,
  sunAltitude,
  todayAt,
} from '@lampwright/geometry/night';
import { type PlanDocument, recordOf, recordsOf } from '@lampwright/geometry/plan';
import { createStore, type StoreApi } from 'zustand/vanilla';
import type { Preview } from '../tools/tool';
import type { LightEngine } from './engine';
import type { FiguresAsk, Subject } from './figures';
import { FiguresDesk } from './figures-desk';
import type { OfferedGroup } from './here';
import { type LatticePlace, latticeOf } from './lattice';
import { atMinutes, type EveningLine, eveningLineOf, minutesInto, type ZoneLooks } from './moments';
import { previewed } from './previewed';
import { type Shares, sharesAt } from './shares';

/** What one picture is made from. */
export interface NightFrame {
  readonly light: LightMap;
  readonly look: Look;
  readonly whiteLux: number;
}

/** What the night view is of; whoever holds it tells it when any of this changes. */
export interface NightInput {
  readonly doc: PlanDocument;
  readonly sheetId: string;
  /** As last reckoned, by fixture. */
  readonly volts: ReadonlyMap<string, number>;
  readonly groups: readonly OfferedGroup[];
  readonly groupOf: ReadonlyMap<string, string>;
  readonly where: EveningPlace;
  /** The unit that light is told in. */
  readonly unit: LuxUnit;
  readonly selection: ReadonlySet<string>;
  /** What the hand at work is about to change. */
  readonly preview: Preview | null;
}

export type NightWork =
  /** Nothing is asked for: it is day, or the picture is as it should be. */
  { readonly is: 'rest' } | { readonly is: 'working' } | { readonly is: 'failed'; readonly message: string };

export interface NightState {
  readonly open: boolean;
  readonly evening: Evening;
  readonly line: EveningLine;
  readonly at: Date;
  readonly playing: boolean;
  readonly zones: readonly ControlZone[];
  /** What can and can't be switched apart, as sentences. */
  readonly together: readonly string[];
  readonly looks: ZoneLooks;
  readonly groupsOff: ReadonlySet<string>;
  /** The plan as it is, without what the hand is about to change; null: the sheet has no scale. */
  readonly scene: NightScene | null;
  /** What to know of its lamps. */
  readonly notes: readonly NightNote[];
  readonly frame: NightFrame | null;
  readonly work: NightWork;
  /** Figures of light are shown on the ground. */
  readonly luxOnGround: boolean;
  /** Where; none while they are not. */
  readonly lattice: readonly LatticePlace[];
}

export interface NightDeps {
  readonly engine: LightEngine;
  readonly now: () => Date;
  /** Calls back before the next picture is shown. */
  readonly nextFrame: (call: () => void) => void;
  /** Pixels of the longer side of the light's map. */
  readonly longEdge: number;
  /** Calls back after so long; gives what takes it back. */
  readonly later: (ms: number, call: () => void) => () => void;
}

/** The whole evening is played in so many seconds. */
export const PLAY_SECONDS = 24;

/**
 * The night view of a plan without any canvas: which evening it is, what shines, and how much light is where.
 * Light is worked out elsewhere, one question at a time; while it is, newer ones wait and only the newest is asked.
 */
export class NightController {
  readonly state: StoreApi<NightState>;
  readonly figures: FiguresDesk;
  private asked: { readonly scene: NightScene; readonly shares: Shares } | null = null;
  private running = false;
  private waiting = false;
  private closed = false;
  private playedAt = 0;
  /** Lux on white while its slider is being moved. */
  private whiteLux: number | null = null;
  private idle: (() => void)[] = [];
  private readonly made = new LastMade<ReturnType<typeof sceneWithNotes>>();
  private readonly drawn = new LastMade<NightScene>();
  private readonly litScene = new LastMade<NightScene>();
  private readonly look = new LastMade<Look>();
  private readonly lattice = new LastMade<readonly LatticePlace[]>();
  private readonly subjects = new LastMade<readonly Subject[]>();
  private readonly figuresAsk = new LastMade<FiguresAsk>();

  constructor(
    private input: NightInput,
    private readonly deps: NightDeps,
  ) {
    const { zones, together } = controlZonesOf(input.doc);
    const evening = eveningOf(input.where, todayAt(input.where.timeZone, deps.now()));
    const line = eveningLineOf(evening, zones);
    this.state = createStore<NightState>(() => ({
      open: false,
      evening,
      line,
      at: line.first,
      playing: false,
      zones,
      together,
      looks: new Map(),
      groupsOff: new Set(input.groups.filter(({ on }) => !on).map(({ id }) => id)),
      scene: null,
      notes: [],
      frame: null,
      work: { is: 'rest' },
      luxOnGround: false,
      lattice: [],
    }));
    this.figures = new FiguresDesk(deps);
  }

  /** Something of what the picture is made from has changed. */
  follow(next: Partial<NightInput>): void {
    const before = this.input;
    const input = { ...before, ...next };
    this.input = input;
    if (input.groups !== before.groups) this.followGroups(before.groups);
    if (input.doc !== before.doc) {
      const { zones, together } = controlZonesOf(input.doc);
      this.state.setState({ zones, together });
    }
    if (input.doc !== before.doc || input.where !== before.where) this.setEvening();
    if (input.sheetId !== before.sheetId) this.state.setState({ frame: null });
    this.refresh();
  }

  open(): void {
    if (this.state.getState().open) return;
    // The day may have changed while the page stood open.
    this.setEvening();
    this.state.setState({ open: true });
    this.refresh();
  }

  shut(): void {
    this.state.setState({ open: false, playing: false });
  }

  /** Moves to a moment of the evening, in minutes from the start of its line. */
  seek(minutes: number): void {
    const { line } = this.state.getState();
    this.state.setState({
      at: atMinutes(line, Math.min(Math.max(minutes, 0), line.minutes)),
      playing: false,
    });
    this.refresh();
  }

  play(): void {
    const { line, at } = this.state.getState();
    const over = at.getTime() >= line.end.getTime();
    this.state.setState({ playing: true, ...(over && { at: line.start }) });
    this.playedAt = this.deps.now().getTime();
    this.deps.nextFrame(() => this.step());
  }

  pause(): void {
    this.state.setState({ playing: false });
  }

  /** Looks at a zone switched on or off; null: as its schedule says. */
  lookAtZone(zoneId: string, look: 'on' | 'off' | null): void {
    const looks = new Map(this.state.getState().looks);
    if (look === null) looks.delete(zoneId);
    else looks.set(zoneId, look);
    this.state.setState({ looks });
    this.refresh();
  }

  takeGroup(groupId: string, taken: boolean): void {
    const groupsOff = new Set(this.state.getState().groupsOff);
    if (taken) groupsOff.delete(groupId);
    else groupsOff.add(groupId);
    this.state.setState({ groupsOff });
    this.refresh();
  }

  /** Shows another brightest spot while it is being chosen; null: the sheet's own. */
  tryWhite(lux: number | null): void {
    this.whiteLux = lux;
    this.reframe();
  }

  showLux(luxOnGround: boolean): void {
    this.state.setState({ luxOnGround });
    this.refresh();
  }

  /** Asks again after a failure. */
  retry(): void {
    this.asked = null;
    this.refresh();
  }

  /** The picture of a moment as far as its light is known; null while it is not. */
  frame(at: Date): NightFrame | null {
    const { evening, frame, scene } = this.state.getState();
    if (frame === null || scene === null) return null;
    return { ...frame, look: this.lookOf(evening, at), whiteLux: this.whiteLux ?? scene.whiteLux };
  }

  /** The scene with what is switched off for looking left dark, whatever the hour: what figures are of. */
  lit(): NightScene | null {
    const { scene, looks, groupsOff } = this.state.getState();
    if (scene === null) return null;
    return this.litScene.of(
      () => {
        const shares = sharesAt(scene, null, { looks, groupsOff });
        return { ...scene, sources: scene.sources.filter(({ id }) => (shares[id] ?? 0) > 0) };
      },
      scene,
      looks,
      groupsOff,
    );
  }

  /** Resolves when no light is being worked out. */
  settled(): Promise<void> {
    if (!this.running && !this.waiting) return Promise.resolve();
    return new Promise((resolve) => this.idle.push(resolve));
  }

  close(): void {
    this.closed = true;
    this.figures.close();
    this.deps.engine.close();
    this.wake();
  }

  private followGroups(before: readonly OfferedGroup[]): void {
    // What a person has switched here stays; a group that is new begins as it is offered.
    const known = new Set(before.map(({ id }) => id));
    const { groupsOff } = this.state.getState();
    const off = this.input.groups.filter(({ id, on }) => (known.has(id) ? groupsOff.has(id) : !on));
    this.state.setState({ groupsOff: new Set(off.map(({ id }) => id)) });
  }

  private setEvening(): void {
    const { zones, at, line: before } = this.state.getState();
    const { where } = this.input;
    const evening = eveningOf(where, todayAt(where.timeZone, this.deps.now()));
    const line = eveningLineOf(evening, zones);
    const stays = at !== before.first && minutesInto(line, at) >= 0 && at.getTime() <= line.end.getTime();
    this.state.setState({ evening, line, at: stays ? at : line.first });
  }

  private step(): void {
    const { playing, line, at } = this.state.getState();
    if (!playing || this.closed) return;
    const now = this.deps.now().getTime();
    const share = (now - this.playedAt) / 1000 / PLAY_SECONDS;
    this.playedAt = now;
    const span = line.end.getTime() - line.start.getTime();
    const next = new Date(Math.min(at.getTime() + share * span, line.end.getTime()));
    this.state.setState({ at: next, playing: next.getTime() < line.end.getTime() });
    this.refresh();
    this.deps.nextFrame(() => this.step());
  }

  /** Takes over what changed at most once a picture. */
  private refresh(): void {
    if (!this.state.getState().open || this.waiting || this.closed) return;
    this.waiting = true;
    this.deps.nextFrame(() => {
      this.waiting = false;
      if (this.closed || !this.state.getState().open) this.wake();
      else this.update();
    });
  }

  private update(): void {
    const { doc, sheetId, volts, groupOf, preview } = this.input;
    const made = this.made.of(
      () => sceneWithNotes(doc, sheetId, volts, groupOf),
      doc,
      sheetId,
      volts,
      groupOf,
    );
    const still = made?.scene ?? null;
    if (still !== this.state.getState().scene)
      this.state.setState({ scene: still, notes: made?.notes ?? [] });
    if (still === null) {
      this.asked = null;
      this.state.setState({ frame: null, work: { is: 'rest' }, lattice: [] });
      this.figures.want(null);
      this.wake();
      return;
    }
    // While the hand is at work the picture comes first.
    if (preview?.kind !== 'move' && preview?.kind !== 'aim') this.wantFigures(still);
    const scene = this.drawn.of(() => this.underHand(still), still, preview);
    const { evening, at, looks, groupsOff } = this.state.getState();
    this.ask(scene, sharesAt(scene, { evening, at }, { looks, groupsOff }), scene !== still);
    this.reframe();
  }

  private wantFigures(still: NightScene): void {
    const { doc, sheetId, selection, unit } = this.input;
    const { luxOnGround } = this.state.getState();
    const lattice = this.lattice.of(
      () => {
        const sheet = recordOf(doc, sheetId, 'sheet');
        const scale = sheet === undefined ? null : scaleOfSheet(sheet);
        return luxOnGround && scale?.ok ? latticeOf(still, scale.scale) : [];
      },
      still,
      luxOnGround,
    );
    if (lattice !== this.state.getState().lattice) this.state.setState({ lattice });
    const subjects = this.subjects.of(() => subjectsOf(doc, sheetId, selection), doc, sheetId, selection);
    const scene = this.lit()!;
    const ask = this.figuresAsk.of(
      () => ({ scene, doc, unit, subjects, places: lattice.map(({ ground }) => ground) }),
      ...[scene, doc, unit, subjects, lattice],
    );
    this.figures.want(ask);
  }

  /** The scene with lamps as the hand is about to leave them. Surfaces are worked out anew only when it lets go. */
  private underHand(still: NightScene): NightScene {
    const { doc, sheetId, volts, groupOf, preview } = this.input;
    const shown = previewed(doc, preview);
    if (shown === doc) return still;
    const scene = nightSceneOf(shown, sheetId, volts, groupOf);
    return scene === null ? still : { ...still, sources: scene.sources, zones: scene.zones };
  }

  private ask(scene: NightScene, shares: Shares, moving: boolean): void {
    const before = this.asked;
    const { work } = this.state.getState();
    if (work.is === 'failed' && before?.scene === scene) return;
    if (before !== null && before.scene === scene && sameShares(before.shares, shares)) {
      if (!this.running) this.wake();
      return;
    }
    if (this.running) return;
    this.asked = { scene, shares };
    this.running = true;
    this.state.setState({ work: { is: 'working' } });
    this.deps.engine.light({ scene, shares, longEdge: this.deps.longEdge, moving }).then(
      (light) => {
        this.running = false;
        if (this.closed) return;
        const { sheetId } = this.input;
        if (scene.sheetId === sheetId) {
          this.state.setState({ work: { is: 'rest' } });
          this.setFrame(light, scene);
        }
        this.refresh();
        if (!this.waiting) this.wake();
      },
      (error: unknown) => {
        this.running = false;
        if (this.closed) return;
        const message = error instanceof Error ? error.message : String(error);
        this.state.setState({ work: { is: 'failed', message } });
        this.wake();
      },
    );
  }

  private setFrame(light: LightMap, { whiteLux }: NightScene): void {
    const { evening, at } = this.state.getState();
    this.state.setState({
      frame: { light, look: this.lookOf(evening, at), whiteLux: this.whiteLux ?? whiteLux },
    });
  }

  /** The same light at another hour, or shown brighter or darker. */
  private reframe(): void {
    const { frame: before, at } = this.state.getState();
    const next = before === null ? null : this.frame(at);
    if (next === null || before === null) return;
    // Whoever draws it draws it anew for every frame, so one that is the same is not made.
    if (next.whiteLux === before.whiteLux && next.look === before.look) return;
    this.state.setState({ frame: next });
  }

  private lookOf(evening: Evening, at: Date): Look {
    return this.look.of(() => lookAt(sunAltitude(evening, at)), evening, at);
  }

  private wake(): void {
    const waiters = this.idle;
    this.idle = [];
    for (const wake of waiters) wake();
  }
}

/** What of a sheet has its light told: what has a target, and what is chosen. */
function subjectsOf(doc: PlanDocument, sheetId: string, chosen: ReadonlySet<string>): Subject[] {
  const told = (record: { id: string; sheetId: string; lightTarget: unknown }): boolean =>
    record.sheetId === sheetId && (record.lightTarget !== null || chosen.has(record.id));
  const subjects: Subject[] = [];
  for (const { id, points, ...record } of recordsOf(doc, 'measurement'))
    if (told({ id, ...record })) subjects.push({ id, kind: 'path', points });
  for (const { id, points, ...record } of recordsOf(doc, 'area'))
    if (told({ id, ...record })) subjects.push({ id, kind: 'area', points });
  return subjects;
}

/** What was made last, for as long as it would be made from the same. */
class LastMade<T> {
  private last: { readonly from: readonly unknown[]; readonly value: T } | null = null;

  of(make: () => T, ...from: readonly unknown[]): T {
    if (this.last === null || from.some((part, i) => part !== this.last?.from[i]))
      this.last = { from, value: make() };
    return this.last.value;
  }
}

function sameShares(a: Shares, b: Shares): boolean {
  const keys = Object.keys(a);
  return keys.length === Object.keys(b).length && keys.every((key) => a[key] === b[key]);
}
