/** Keeps the values used last, up to `capacity` in all; each value says how much of that it takes. */
export class BoundedCache<Value extends { readonly size: number }> {
  readonly #values = new Map<string, Value>();
  #filled = 0;

  constructor(private readonly capacity: number) {}

  get(key: string): Value | undefined {
    const value = this.#values.get(key);
    if (value === undefined) return undefined;
    // A map keeps the order of insertion: what is used goes to the end.
    this.#values.delete(key);
    this.#values.set(key, value);
    return value;
  }

  set(key: string, value: Value): void {
    this.#filled += value.size - (this.#values.get(key)?.size ?? 0);
    this.#values.delete(key);
    this.#values.set(key, value);
    for (const [oldest, { size }] of this.#values) {
      if (this.#filled <= this.capacity) return;
      this.#values.delete(oldest);
      this.#filled -= size;
    }
  }
}
