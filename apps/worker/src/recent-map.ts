/** A map that keeps the entries used last and drops the others. */
export class RecentMap<Key, Value> {
  readonly #entries = new Map<Key, Value>();

  constructor(private readonly size: number) {}

  get(key: Key): Value | undefined {
    const value = this.#entries.get(key);
    if (value !== undefined) this.set(key, value);
    return value;
  }

  /** Map keeps insertion order: re-inserting makes this entry the most recently used. */
  set(key: Key, value: Value): void {
    this.#entries.delete(key);
    this.#entries.set(key, value);
    for (const oldest of this.#entries.keys()) {
      if (this.#entries.size <= this.size) break;
      this.#entries.delete(oldest);
    }
  }

  delete(key: Key): void {
    this.#entries.delete(key);
  }
}
