import { emptyPricing, type JobPricing } from '@lampwright/geometry/price';
import { describe, expect, it } from 'vitest';
import { addGroup, changeGroup, setTerms } from './edits';
import { type Keeper, type Kept, localKeeper } from './kept';
import { type Clock, type PricingPort, PricingStore, type SaveAnswer, type Versioned } from './pricing-store';

/** A server in memory that refuses a save on top of anything but its present version. */
class Server implements PricingPort {
  at: Versioned = { version: 0, pricing: emptyPricing };
  down = false;
  saves = 0;
  /** Holds answers back while set. */
  gate: Promise<void> | null = null;

  async load(): Promise<Versioned> {
    if (this.down) throw new TypeError('no network');
    return this.at;
  }

  async save(baseVersion: number, pricing: JobPricing): Promise<SaveAnswer> {
    this.saves += 1;
    await this.gate;
    if (this.down) return { is: 'waiting', message: 'The server cannot be reached.' };
    if (baseVersion !== this.at.version) return { is: 'conflict' };
    this.at = { version: baseVersion + 1, pricing };
    return { is: 'saved', at: this.at };
  }

  /** Somebody else at work. */
  other(edit: (pricing: JobPricing) => JobPricing): void {
    this.at = { version: this.at.version + 1, pricing: edit(this.at.pricing) };
  }
}

class Later implements Clock {
  private calls = new Set<() => void>();
  after(_ms: number, call: () => void) {
    this.calls.add(call);
    return () => void this.calls.delete(call);
  }
  /** Lets time pass until nothing more is due by itself, or so many rounds went by. */
  async pass(rounds = 5): Promise<void> {
    for (let i = 0; i < rounds; i++) {
      const due = [...this.calls];
      this.calls.clear();
      for (const call of due) call();
      await new Promise((done) => setTimeout(done, 0));
    }
  }
}

function memory(): Keeper & { kept: Kept | null } {
  return {
    kept: null,
    read() {
      return this.kept;
    },
    write(kept) {
      this.kept = kept;
    },
  };
}

const group = (id: string) => ({ id, name: `Group ${id}`, description: '', on: true });

async function opened(server = new Server(), keeper = memory()) {
  const clock = new Later();
  const saved: number[] = [];
  const store = new PricingStore(server, keeper, clock, ({ version }) => saved.push(version));
  await store.start();
  await clock.pass();
  return { server, keeper, clock, store, saved, state: () => store.state.getState() };
}

describe('the pricing of a job at work', () => {
  it('shows an edit at once and saves edits that come together in one go', async () => {
    const { store, clock, server, state, saved } = await opened();
    store.edit('Add a group', addGroup(group('a')));
    store.edit('Taxes', setTerms({ taxExempt: true }));
    expect(state().pricing.groups).toHaveLength(1);
    expect(state().unsent).toBe(2);
    await clock.pass();
    expect(server.saves).toBe(1);
    expect(server.at.pricing.taxExempt).toBe(true);
    expect(state()).toMatchObject({ unsent: 0, save: { is: 'saved' } });
    expect(saved).toEqual([1]);
  });

  it('has one save in flight, and sends what was written meanwhile after it', async () => {
    const { store, clock, server, state } = await opened();
    let open = () => {};
    server.gate = new Promise((release) => {
      open = release;
    });
    store.edit('Add a group', addGroup(group('a')));
    await clock.pass(2);
    store.edit('Rename', changeGroup('a', { name: 'Front walk' }));
    await clock.pass(2);
    expect(server.saves).toBe(1);
    server.gate = null;
    open();
    await clock.pass();
    expect(server.saves).toBe(2);
    expect(server.at.pricing.groups[0]?.name).toBe('Front walk');
    expect(state().unsent).toBe(0);
  });

  it('keeps edits without a network, through a reload, and sends them later', async () => {
    const { store, clock, server, keeper, state } = await opened();
    server.down = true;
    store.edit('Add a group', addGroup(group('a')));
    await clock.pass(2);
    expect(state().save).toEqual({ is: 'waiting', message: 'The server cannot be reached.' });
    expect(keeper.kept?.unsent).toBe(1);
    server.down = false;
    // Somebody else changed something meanwhile.
    server.other(setTerms({ aimingVisits: 3 }));

    const again = await opened(server, keeper);
    expect(again.state().pricing.groups).toHaveLength(1);
    expect(server.at.pricing).toMatchObject({ aimingVisits: 3, groups: [{ id: 'a' }] });
    expect(keeper.kept).toBeNull();
  });

  it('puts its edits on top of somebody else’s where they touch different things', async () => {
    const { store, clock, server, state } = await opened();
    server.other(setTerms({ aimingVisits: 3 }));
    store.edit('Add a group', addGroup(group('a')));
    await clock.pass();
    expect(server.at.pricing).toMatchObject({ aimingVisits: 3, groups: [{ id: 'a' }] });
    expect(state()).toMatchObject({ unsent: 0, clash: null, pricing: { aimingVisits: 3 } });
  });

  it('asks where both changed the same, and saves what was chosen', async () => {
    const { store, clock, server, state } = await opened();
    server.other(setTerms({ aimingVisits: 3 }));
    store.edit('Visits', setTerms({ aimingVisits: 2 }));
    await clock.pass();
    expect(state().save).toEqual({ is: 'choosing' });
    expect(state().clash?.parts).toEqual([{ part: 'visits', id: '' }]);
    expect(server.at.pricing.aimingVisits).toBe(3);
    store.settle(() => 'mine');
    await clock.pass();
    expect(server.at.pricing.aimingVisits).toBe(2);
    expect(state()).toMatchObject({ unsent: 0, clash: null });
  });

  it('undoes its own step only, and redoes it', async () => {
    const { store, clock, server, state } = await opened();
    store.edit('Add a group', addGroup(group('a')));
    store.edit('Visits', setTerms({ aimingVisits: 2 }));
    await clock.pass();
    server.other(setTerms({ taxExempt: true }));
    await store.refresh();
    expect(state().undoLabel).toBe('Visits');
    store.undo();
    store.undo();
    expect(state()).toMatchObject({ undoLabel: null, redoLabel: 'Add a group' });
    await clock.pass();
    expect(server.at.pricing).toMatchObject({ groups: [], aimingVisits: null, taxExempt: true });
    store.redo();
    await clock.pass();
    expect(server.at.pricing.groups).toHaveLength(1);
  });

  it('leaves what somebody else changed since alone when undoing, and says so', async () => {
    const { store, clock, server, state } = await opened();
    store.edit('Visits', setTerms({ aimingVisits: 2 }));
    await clock.pass();
    server.other(setTerms({ aimingVisits: 5 }));
    await store.refresh();
    store.undo();
    expect(state().pricing.aimingVisits).toBe(5);
    expect(state().notes).toEqual(['One thing was changed since, and left as it is.']);
  });

  it('sends what is unsent when the page goes', async () => {
    const { store, server, keeper } = await opened();
    store.edit('Visits', setTerms({ aimingVisits: 2 }));
    store.stop();
    await new Promise((done) => setTimeout(done, 0));
    expect(server.at.pricing.aimingVisits).toBe(2);
    expect(keeper.kept).toBeNull();
  });
});

describe('what is kept in the browser', () => {
  it('is apart for each person, company and job, and only taken up when it can be read', () => {
    const kept = new Map<string, string>();
    const storage = {
      getItem: (key: string) => kept.get(key) ?? null,
      setItem: (key: string, value: string) => void kept.set(key, value),
      removeItem: (key: string) => void kept.delete(key),
    } as unknown as Storage;
    const of = (userId: string) => localKeeper({ userId, companyId: 'c', jobId: 'j' }, storage);
    const edits: Kept = { baseVersion: 1, base: emptyPricing, mine: emptyPricing, unsent: 1 };
    of('one').write(edits);
    expect(of('one').read()).toEqual(edits);
    expect(of('two').read()).toBeNull();
    kept.set([...kept.keys()][0] ?? '', '{"mine": 3}');
    expect(of('one').read()).toBeNull();
  });
});
