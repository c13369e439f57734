import { createStore, type StoreApi } from 'zustand/vanilla';
import type { LightEngine } from './engine';
import type { FiguresAnswer, FiguresAsk } from './figures';

export interface FiguresState {
  /** What the answer is of. */
  readonly asked: FiguresAsk | null;
  readonly answer: FiguresAnswer | null;
  /** The answer is of an older scene; a new one is on its way. */
  readonly stale: boolean;
  readonly problem: string | null;
}

export interface FiguresDeps {
  readonly engine: Pick<LightEngine, 'figures'>;
  /** Calls back when nothing was asked for so long; gives what takes it back. */
  readonly later: (ms: number, call: () => void) => () => void;
}

/** Changes closer together than this make one question. */
const REST_MS = 200;

/** Keeps figures of light up to date, once the hand rests: one question at a time, the newest next. */
export class FiguresDesk {
  readonly state: StoreApi<FiguresState> = createStore<FiguresState>(() => ({
    asked: null,
    answer: null,
    stale: false,
    problem: null,
  }));
  private wanted: FiguresAsk | null = null;
  private running = false;
  private takeBack: (() => void) | null = null;

  constructor(private readonly deps: FiguresDeps) {}

  /** These figures are wanted now; null: none. */
  want(ask: FiguresAsk | null): void {
    if (ask === this.wanted) return;
    this.wanted = ask;
    this.takeBack?.();
    this.takeBack = null;
    if (ask === null) {
      this.state.setState({ asked: null, answer: null, stale: false, problem: null });
      return;
    }
    this.state.setState({ stale: true });
    this.takeBack = this.deps.later(REST_MS, () => {
      this.takeBack = null;
      this.run();
    });
  }

  retry(): void {
    this.run();
  }

  close(): void {
    this.want(null);
  }

  private run(): void {
    const ask = this.wanted;
    if (ask === null || this.running) return;
    this.running = true;
    const done = () => {
      this.running = false;
      // Something newer came while this was worked out, and has waited its while already.
      if (this.wanted !== ask && this.takeBack === null) this.run();
    };
    this.deps.engine.figures(ask).then(
      (answer) => {
        if (this.wanted !== null)
          this.state.setState({ asked: ask, answer, stale: this.wanted !== ask, problem: null });
        done();
      },
      (error: unknown) => {
        const problem = error instanceof Error ? error.message : String(error);
        if (this.wanted === ask) this.state.setState({ problem });
        done();
      },
    );
  }
}
