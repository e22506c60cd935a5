/** A queue from which the cheapest comes first; of equals any. Source: the binary heap of Williams (1964). */
export type CheapestFirst<T> = { readonly push: (item: T) => void; readonly pop: () => T | null };

export function cheapestFirst<T extends { readonly cost: number }>(): CheapestFirst<T> {
  const heap: T[] = [];

  function push(item: T): void {
    let at = heap.length;
    while (at > 0) {
      const above = (at - 1) >> 1;
      if (heap[above]!.cost <= item.cost) break;
      heap[at] = heap[above]!;
      at = above;
    }
    heap[at] = item;
  }

  function sink(item: T): void {
    let at = 0;
    for (let below = 1; below < heap.length; below = 2 * at + 1) {
      if (below + 1 < heap.length && heap[below + 1]!.cost < heap[below]!.cost) below += 1;
      if (heap[below]!.cost >= item.cost) break;
      heap[at] = heap[below]!;
      at = below;
    }
    heap[at] = item;
  }

  function pop(): T | null {
    const first = heap[0];
    const last = heap.pop();
    if (first === undefined || last === undefined) return null;
    if (heap.length > 0) sink(last);
    return first;
  }

  return { push, pop };
}
