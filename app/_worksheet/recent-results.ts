/**
 * The latest results in memory, least recently used out first. It keeps promises, so that two pages that ask at
 * once share one computation; a failed one is forgotten and the next asker tries again.
 */
export class RecentResults<Value> {
  readonly #results = new Map<string, Promise<Value>>();
  readonly #capacity: number;

  constructor(capacity: number) {
    this.#capacity = capacity;
  }

  get(key: string, compute: () => Promise<Value>): Promise<Value> {
    const known = this.#results.get(key);
    if (known !== undefined) {
      this.#results.delete(key);
      this.#results.set(key, known);
      return known;
    }
    const result = compute();
    this.#results.set(key, result);
    result.catch(() => {
      if (this.#results.get(key) === result) this.#results.delete(key);
    });
    for (const oldest of this.#results.keys()) {
      if (this.#results.size <= this.#capacity) break;
      this.#results.delete(oldest);
    }
    return result;
  }
}
