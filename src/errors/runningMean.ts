/** Mean and spread of values that come one at a time (Welford 1962); NaN values are passed over. */
export class RunningMean {
  #count = 0;
  #mean = 0;
  #squares = 0;

  add(value: number): void {
    if (Number.isNaN(value)) return;
    this.#count += 1;
    const step = value - this.#mean;
    this.#mean += step / this.#count;
    this.#squares += step * (value - this.#mean);
  }

  /** NaN without values. */
  get mean(): number {
    return this.#count === 0 ? Number.NaN : this.#mean;
  }

  /** Standard deviation with n - 1; NaN below two values. */
  get standardDeviation(): number {
    return this.#count < 2 ? Number.NaN : Math.sqrt(this.#squares / (this.#count - 1));
  }
}
