/**
 * Picks one entry of each list, cheapest sum first: every choice comes exactly once. Lists are in rising order of
 * cost. Grows by one list's worth of entries a step.
 */
export class ByCost {
  private readonly heap: {
    readonly cost: number;
    readonly picks: readonly number[];
    readonly last: number;
  }[] = [];

  constructor(private readonly costs: readonly (readonly number[])[]) {
    if (costs.some((list) => list.length === 0)) return;
    const picks = costs.map(() => 0);
    this.push({ cost: costs.reduce((sum, list) => sum + list[0]!, 0), picks, last: 0 });
  }

  /** Cost of what comes next; null when all have come. */
  get nextCost(): number | null {
    return this.heap[0]?.cost ?? null;
  }

  next(): readonly number[] | null {
    const top = this.pop();
    if (!top) return null;
    // Only lists from the last raised on are raised, so that no choice is reached by two ways.
    for (let i = top.last; i < this.costs.length; i++) {
      const list = this.costs[i]!;
      const at = top.picks[i]!;
      if (at + 1 >= list.length) continue;
      const picks = top.picks.with(i, at + 1);
      this.push({ cost: top.cost + list[at + 1]! - list[at]!, picks, last: i });
    }
    return top.picks;
  }

  private push(entry: (typeof this.heap)[number]): void {
    const { heap } = this;
    heap.push(entry);
    let i = heap.length - 1;
    while (i > 0) {
      const parent = (i - 1) >> 1;
      if (heap[parent]!.cost <= heap[i]!.cost) break;
      [heap[parent], heap[i]] = [heap[i]!, heap[parent]!];
      i = parent;
    }
  }

  private pop(): (typeof this.heap)[number] | undefined {
    const { heap } = this;
    const top = heap[0];
    const last = heap.pop();
    if (top === undefined || last === undefined || heap.length === 0) return top;
    heap[0] = last;
    let i = 0;
    for (;;) {
      const left = 2 * i + 1;
      const right = left + 1;
      let least = i;
      if (left < heap.length && heap[left]!.cost < heap[least]!.cost) least = left;
      if (right < heap.length && heap[right]!.cost < heap[least]!.cost) least = right;
      if (least === i) return top;
      [heap[least], heap[i]] = [heap[i]!, heap[least]!];
      i = least;
    }
  }
}
