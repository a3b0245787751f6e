/** Mean and squares of many samples, block by block about each block's own mean, so that a long sum keeps its digits. */
export class RunningMoments {
  count = 0;
  mean = 0;
  /** Sum of squares about the mean. */
  #squares = 0;

  /** Takes up `samples[from, to)`, which must be finite. */
  take(samples: Float64Array, from: number, to: number): void {
    const count = to - from;
    if (count <= 0) return;
    let sum = 0;
    for (let i = from; i < to; i++) sum += samples[i];
    const mean = sum / count;
    let squares = 0;
    for (let i = from; i < to; i++) squares += (samples[i] - mean) ** 2;
    const total = this.count + count;
    const shift = mean - this.mean;
    this.#squares += squares + (shift * shift * this.count * count) / total;
    this.mean += (shift * count) / total;
    this.count = total;
  }

  /** Standard deviation about the mean (divided by the count); NaN without samples. */
  get deviation(): number {
    return this.count === 0 ? NaN : Math.sqrt(this.#squares / this.count);
  }

  /** Root mean square about zero. */
  get rms(): number {
    return this.count === 0 ? NaN : Math.hypot(this.mean, this.deviation);
  }
}
