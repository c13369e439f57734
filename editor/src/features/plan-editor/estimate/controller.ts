import {
  type CableLength,
  cableLengths,
  type EstimateAnswer,
  type EstimateRequest,
  estimateRequestOf,
  type PlanEstimate,
} from '@lampwright/geometry/estimate';
import type { PlanDocument } from '@lampwright/geometry/plan';
import { createStore, type StoreApi } from 'zustand/vanilla';
import { type Answers, indexAnswer } from '../../../plan-view/answers';

export interface EstimateState {
  /** The plan that `plan` and `lengths` are of. */
  readonly doc: PlanDocument | null;
  readonly plan: PlanEstimate | null;
  readonly unwired: ReadonlySet<string>;
  readonly lengths: ReadonlyMap<string, CableLength>;
  readonly answer: EstimateAnswer | null;
  readonly answers: Answers | null;
  /** The answer is of an older plan; a new one is on its way. */
  readonly stale: boolean;
  /** Why there is no answer to the plan as it is. */
  readonly problem: string | null;
}

export interface EstimateDeps {
  /** Rejects with DOMException AbortError when aborted. */
  ask(request: EstimateRequest, signal: AbortSignal): Promise<EstimateAnswer>;
  /** A sentence for the person. */
  sentence(error: unknown): string;
}

/** Changes closer together than this make one request. */
export const DEBOUNCE_MS = 120;

/** Keeps the volts of a plan up to date: one request at a time, superseded ones aborted. */
export class EstimateController {
  readonly state: StoreApi<EstimateState> = createStore<EstimateState>(() => ({
    doc: null,
    plan: null,
    unwired: new Set(),
    lengths: new Map(),
    answer: null,
    answers: null,
    stale: false,
    problem: null,
  }));
  private timer: ReturnType<typeof setTimeout> | null = null;
  private running: AbortController | null = null;
  private waiters: (() => void)[] = [];
  /** What the answer in hand, or the one under way, was asked for; the same question is not asked twice. */
  private asked: string | null = null;

  constructor(private readonly deps: EstimateDeps) {}

  /** The plan is now this one. */
  follow(doc: PlanDocument): void {
    if (doc === this.state.getState().doc) return;
    const lengths = cableLengths(doc);
    const plan = estimateRequestOf(doc, lengths);
    const question = plan.request === null ? null : JSON.stringify(plan.request);
    this.state.setState({ doc, plan, lengths, unwired: new Set(plan.unwired) });
    if (question === this.asked && this.state.getState().problem === null) return;
    this.asked = question;
    this.drop();
    if (plan.request === null) {
      this.state.setState({ answer: null, answers: null, stale: false, problem: null });
      this.settle();
      return;
    }
    const { request } = plan;
    this.state.setState({ stale: true });
    this.timer = setTimeout(() => {
      this.timer = null;
      void this.run(request);
    }, DEBOUNCE_MS);
  }

  /** Asks again after a failure. */
  retry(): void {
    const { plan } = this.state.getState();
    if (plan === null || plan.request === null) return;
    this.drop();
    this.state.setState({ stale: true });
    void this.run(plan.request);
  }

  /** Resolves when no request is waiting or under way. */
  settled(): Promise<void> {
    if (this.timer === null && this.running === null) return Promise.resolve();
    return new Promise((resolve) => this.waiters.push(resolve));
  }

  close(): void {
    this.drop();
    this.settle();
  }

  private async run(request: EstimateRequest): Promise<void> {
    const running = new AbortController();
    this.running = running;
    try {
      const answer = await this.deps.ask(request, running.signal);
      if (running.signal.aborted) return;
      this.state.setState({ answer, answers: indexAnswer(answer), stale: false, problem: null });
    } catch (error) {
      if (running.signal.aborted) return;
      this.state.setState({ stale: true, problem: this.deps.sentence(error) });
    } finally {
      if (this.running === running) {
        this.running = null;
        this.settle();
      }
    }
  }

  private drop(): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    this.running?.abort();
    this.running = null;
  }

  private settle(): void {
    const waiters = this.waiters;
    this.waiters = [];
    for (const wake of waiters) wake();
  }
}
