/** Numbers 0 to n - 1 in groups that only ever merge (union-find with path halving). */
export class DisjointSets {
  private readonly parent: Int32Array;

  constructor(count: number) {
    this.parent = new Int32Array(count);
    for (let k = 0; k < count; k++) this.parent[k] = k;
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
    const groups = new Int32Array(this.parent.length);
    for (let k = 0; k < groups.length; k++) groups[k] = this.find(k);
    return groups;
  }
}
