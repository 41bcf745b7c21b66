/** The results of the most recent computations by address; asking twice at once computes once. */
export class RecentResults<Result> {
  readonly #capacity: number
  readonly #results = new Map<string, Promise<Result>>()

  constructor(capacity: number) {
    this.#capacity = capacity
  }

  has(address: string): boolean {
    return this.#results.has(address)
  }

  get(address: string, compute: () => Promise<Result>): Promise<Result> {
    const known = this.#results.get(address)
    this.#results.delete(address)
    const result = known ?? compute()
    this.#results.set(address, result)
    if (!known) result.catch(() => this.#results.delete(address))
    for (const oldest of this.#results.keys()) {
      if (this.#results.size <= this.#capacity) break
      this.#results.delete(oldest)
    }
    return result
  }
}
