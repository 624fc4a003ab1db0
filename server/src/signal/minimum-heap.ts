/** A queue that gives back the item of least key first. */
export class MinimumHeap<Item> {
  private readonly items: { readonly key: number; readonly item: Item }[] = [];

  constructor(private readonly keyOf: (item: Item) => number) {}

  /** The item of least key, left in place; `undefined` where there is none. */
  least(): Item | undefined {
    return this.items[0]?.item;
  }

  add(item: Item): void {
    const entry = { key: this.keyOf(item), item };
    let index = this.items.length;
    while (index > 0) {
      const parent = (index - 1) >> 1;
      if (this.items[parent]!.key <= entry.key) break;
      this.items[index] = this.items[parent]!;
      index = parent;
    }
    this.items[index] = entry;
  }

  removeLeast(): void {
    const last = this.items.pop();
    if (last === undefined || this.items.length === 0) return;
    let index = 0;
    for (;;) {
      const left = 2 * index + 1;
      if (left >= this.items.length) break;
      const right = left + 1;
      const child = right < this.items.length && this.items[right]!.key < this.items[left]!.key ? right : left;
      if (this.items[child]!.key >= last.key) break;
      this.items[index] = this.items[child]!;
      index = child;
    }
    this.items[index] = last;
  }
}
