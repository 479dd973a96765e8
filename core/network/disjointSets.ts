/** Numbers 0 to n - 1 in groups that only ever merge (union-find with path halving). */
export class DisjointSets {
  private readonly parent: Int32Array;

  constructor(count: number) {
    this.parent = Int32Array.from({ length: count }, (_, k) => k);
  }

  /** The member that stands for the group of `k`. */
  find(k: number): number {
    const { parent } = this;
    let at = k;
    while (parent[at] !== at) {
      parent[at] = parent[parent[at]!]!;
      at = parent[at]!;
    }
    return at;
  }

  join(p: number, q: number): void {
    this.parent[this.find(p)] = this.find(q);
  }

  /** For each number the one that stands for its group. */
  groups(): Int32Array {
    return this.parent.map((_, k) => this.find(k));
  }
}
