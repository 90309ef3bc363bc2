/** A list of things with ids that is copied once, at its first change, and finds its items without a search. */
export interface ItemList<T extends { id: string }> {
  items: readonly T[];
  copied: boolean;
  /** Where each id stood when it was last seen; insertions and removals before it may have moved it since. */
  lastIndex: Map<string, number>;
}

/** When an id occurs twice, its first place counts. */
export function itemList<T extends { id: string }>(items: readonly T[]): ItemList<T> {
  const lastIndex = new Map<string, number>();
  items.forEach((item, index) => {
    if (!lastIndex.has(item.id)) lastIndex.set(item.id, index);
  });
  return { items, copied: false, lastIndex };
}

/** The index of an id, or −1. Looks outwards from where it last stood. */
export function findItem<T extends { id: string }>(list: ItemList<T>, id: string): number {
  const around = list.lastIndex.get(id);
  if (around === undefined) return -1;
  const furthest = Math.max(around, list.items.length - 1 - around);
  for (let step = 0; step <= furthest; step++) {
    const found =
      list.items[around - step]?.id === id
        ? around - step
        : list.items[around + step]?.id === id
          ? around + step
          : -1;
    if (found !== -1) {
      list.lastIndex.set(id, found);
      return found;
    }
  }
  return -1;
}

export function addItem<T extends { id: string }>(
  list: ItemList<T>,
  item: T,
  index = list.items.length,
): void {
  const at = Math.max(0, Math.min(Math.trunc(index), list.items.length));
  writable(list).splice(at, 0, item);
  list.lastIndex.set(item.id, at);
}

export function removeItem<T extends { id: string }>(list: ItemList<T>, index: number): T {
  const [item] = writable(list).splice(index, 1);
  if (item === undefined) throw new RangeError(`No item at ${index}`);
  list.lastIndex.delete(item.id);
  return item;
}

export function replaceItem<T extends { id: string }>(list: ItemList<T>, index: number, item: T): void {
  writable(list)[index] = item;
}

function writable<T extends { id: string }>(list: ItemList<T>): T[] {
  if (!list.copied) {
    list.items = [...list.items];
    list.copied = true;
  }
  return list.items as T[];
}
