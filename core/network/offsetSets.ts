/** Union-find in which each member keeps its potential difference to its set's root. */
export class OffsetSets {
  private readonly parent: Int32Array;
  private readonly rise: Float64Array; // V(j) - V(parent(j))

  constructor(n: number) {
    this.parent = new Int32Array(n);
    for (let j = 0; j < n; j++) this.parent[j] = j;
    this.rise = new Float64Array(n);
  }

  find(j: number): number {
    let root = j;
    while (this.parent[root] !== root) root = this.parent[root]!;
    // Path compression keeps the rises: first the total, then each member points at the root.
    let total = 0;
    for (let at = j; at !== root; at = this.parent[at]!) total += this.rise[at]!;
    for (let at = j; at !== root; ) {
      const next = this.parent[at]!;
      const rise = this.rise[at]!;
      this.parent[at] = root;
      this.rise[at] = total;
      total -= rise;
      at = next;
    }
    return root;
  }

  potential(j: number): number {
    const root = this.find(j);
    return root === j ? 0 : this.rise[j]!;
  }

  /** Demands V(from) - V(to) = gap. Returns null when that joined two sets, else (present difference - gap). */
  join(from: number, to: number, gap: number): number | null {
    const p = this.find(from);
    const q = this.find(to);
    const present = this.potential(from) - this.potential(to);
    if (p === q) return present - gap;
    this.parent[p] = q;
    this.rise[p] = gap - present;
    return null;
  }
}
