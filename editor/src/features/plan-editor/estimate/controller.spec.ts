import type { EstimateAnswer, EstimateRequest } from '@lampwright/geometry/estimate';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { yardWith } from '../tools/driver.testkit';
import { DEBOUNCE_MS, EstimateController } from './controller';

interface Asked {
  readonly request: EstimateRequest;
  readonly signal: AbortSignal;
  answer(volts: number): void;
  fail(message: string): void;
}

function answerOf(request: EstimateRequest, volts: number): EstimateAnswer {
  const fixtures = request.runs.flatMap((run) =>
    run.fixtures.map((f) => ({
      id: f.id,
      volts,
      amps: 1,
      voltAmps: 1,
      dropPercent: 0,
      state: 'in-window' as const,
      aim: null,
    })),
  );
  return { fixtures, cables: [], runs: [], commons: [], taps: [], transformers: [], warnings: [] };
}

function setUp() {
  const asked: Asked[] = [];
  const controller = new EstimateController({
    ask: (request, signal) =>
      new Promise((resolve, reject) => {
        signal.addEventListener('abort', () => reject(new DOMException('gone', 'AbortError')));
        asked.push({
          request,
          signal,
          answer: (volts) => resolve(answerOf(request, volts)),
          fail: (message) => reject(new Error(message)),
        });
      }),
    sentence: (error) => (error instanceof Error ? error.message : ''),
  });
  const d = yardWith(2);
  d.use('cable').click(100, 100).click(300, 100).key('Enter');
  const state = () => controller.state.getState();
  const volts = () => [...(state().answers?.fixtures.values() ?? [])].map((f) => f.volts);
  return { asked, controller, d, state, volts };
}

const tick = () => vi.advanceTimersByTimeAsync(0);

describe('keeping the volts up to date', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('asks once for changes that come close together', async () => {
    const { asked, controller, d } = setUp();
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS - 1);
    d.use('cable').click(300, 100).click(500, 100).key('Enter');
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS - 1);
    expect(asked).toHaveLength(0);
    await vi.advanceTimersByTimeAsync(1);
    expect(asked).toHaveLength(1);
    expect(asked[0]!.request.runs[0]!.fixtures).toHaveLength(2);
  });

  it('keeps the last answer, greyed, until the next one is there', async () => {
    const { asked, controller, d, state, volts } = setUp();
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    asked[0]!.answer(11.5);
    await tick();
    expect(state().stale).toBe(false);
    d.use('cable').click(300, 100).click(500, 100).key('Enter');
    controller.follow(d.doc);
    expect(state().stale).toBe(true);
    expect(volts()).toEqual([11.5]);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    asked[1]!.answer(11.2);
    await tick();
    expect(state().stale).toBe(false);
    expect(volts()).toEqual([11.2, 11.2]);
  });

  it('aborts a request that a newer plan supersedes, and never shows its answer', async () => {
    const { asked, controller, d, state, volts } = setUp();
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    d.use('cable').click(300, 100).click(500, 100).key('Enter');
    controller.follow(d.doc);
    expect(asked[0]!.signal.aborted).toBe(true);
    asked[0]!.answer(9);
    await tick();
    expect(volts()).toEqual([]);
    expect(state().problem).toBeNull();
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    asked[1]!.answer(11);
    await tick();
    expect(volts()).toEqual([11, 11]);
  });

  it('says why there are no volts, and asks again when told to', async () => {
    const { asked, controller, d, state, volts } = setUp();
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    asked[0]!.fail('The server can’t be reached.');
    await tick();
    expect(state()).toMatchObject({ problem: 'The server can’t be reached.', stale: true });
    controller.retry();
    asked[1]!.answer(12);
    await tick();
    expect(state()).toMatchObject({ problem: null, stale: false });
    expect(volts()).toEqual([12]);
  });

  it('does not ask again for a change that changes no volts', async () => {
    const { asked, controller, d } = setUp();
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    asked[0]!.answer(12);
    await tick();
    d.use('hub').click(900, 900);
    controller.follow(d.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS * 2);
    expect(asked).toHaveLength(1);
  });

  it('knows what is not wired yet without asking, and asks nothing of an empty plan', async () => {
    const { asked, controller, state } = setUp();
    const bare = yardWith(2);
    controller.follow(bare.doc);
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS * 2);
    expect(asked).toHaveLength(0);
    expect(state().unwired.size).toBe(2);
    expect(state().answers).toBeNull();
  });

  it('tells when it has settled', async () => {
    const { asked, controller, d } = setUp();
    let settled = false;
    controller.follow(d.doc);
    void controller.settled().then(() => {
      settled = true;
    });
    await vi.advanceTimersByTimeAsync(DEBOUNCE_MS);
    expect(settled).toBe(false);
    asked[0]!.answer(12);
    await tick();
    expect(settled).toBe(true);
  });
});
