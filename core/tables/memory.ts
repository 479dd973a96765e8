/**
 * Keeps what a pure function found for a part of a job, as long as the part lives. Parts and tables never change, so a kept
 * answer is the answer; it only saves working it out again for every case of the job.
 */
export class Memory<Key extends object, Answer> {
  private readonly kept = new WeakMap<object, WeakMap<Key, Map<string, Answer>>>();

  /** The answer for `key` under `tables`; `detail` spells out everything else that it depends on. */
  of(tables: object, key: Key, detail: string, find: () => Answer): Answer {
    let byKey = this.kept.get(tables);
    if (byKey === undefined) {
      byKey = new WeakMap();
      this.kept.set(tables, byKey);
    }
    let byDetail = byKey.get(key);
    if (byDetail === undefined) {
      byDetail = new Map();
      byKey.set(key, byDetail);
    }
    let answer = byDetail.get(detail);
    if (answer === undefined) {
      answer = find();
      byDetail.set(detail, answer);
    }
    return answer;
  }
}
