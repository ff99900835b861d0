/** A binary heap of numbered things, the least key first, then the least number. */
export class KeyHeap {
  private readonly keys: number[] = [];
  private readonly ids: number[] = [];

  get size(): number {
    return this.keys.length;
  }

  /** The least key; Infinity: it is empty. */
  topKey(): number {
    return this.keys.length > 0 ? this.keys[0]! : Infinity;
  }

  /** Whether its first comes before the other's first; neither is empty. */
  before(other: KeyHeap): boolean {
    const [one, two] = [this.keys[0]!, other.keys[0]!];
    return one < two || (one === two && this.ids[0]! < other.ids[0]!);
  }

  push(key: number, id: number): void {
    let at = this.keys.length;
    this.keys.push(key);
    this.ids.push(id);
    while (at > 0) {
      const up = (at - 1) >> 1;
      if (!this.less(key, id, up)) break;
      this.put(at, this.keys[up]!, this.ids[up]!);
      at = up;
    }
    this.put(at, key, id);
  }

  /** Takes the first out; it is not empty. */
  pop(): number {
    const first = this.ids[0]!;
    const key = this.keys.pop()!;
    const id = this.ids.pop()!;
    const size = this.keys.length;
    if (size === 0) return first;
    let at = 0;
    for (;;) {
      let down = 2 * at + 1;
      if (down >= size) break;
      if (down + 1 < size && this.less(this.keys[down + 1]!, this.ids[down + 1]!, down)) down += 1;
      if (this.less(key, id, down)) break;
      this.put(at, this.keys[down]!, this.ids[down]!);
      at = down;
    }
    this.put(at, key, id);
    return first;
  }

  private less(key: number, id: number, than: number): boolean {
    return key < this.keys[than]! || (key === this.keys[than]! && id < this.ids[than]!);
  }

  private put(at: number, key: number, id: number): void {
    this.keys[at] = key;
    this.ids[at] = id;
  }
}
