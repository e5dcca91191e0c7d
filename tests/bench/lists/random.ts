/** Seeded chance: the same lists on every machine. xorshift32, G. Marsaglia, Journal of Statistical Software 8(14), 2003. */
export class Chance {
  private state: number

  constructor(seed: number) {
    // Neighbouring seeds must not give neighbouring streams, and the generator can't leave 0.
    this.state = (Math.imul(seed + 1, 0x9E3779B1) >>> 0) || 1
    for (let i = 0; i < 8; i++) this.next()
  }

  /** In [0, 1). */
  next(): number {
    let s = this.state
    s ^= s << 13
    s ^= s >>> 17
    s ^= s << 5
    this.state = s >>> 0
    return this.state / 4294967296
  }

  between(low: number, high: number): number {
    return low + (high - low) * this.next()
  }

  /** Even in the logarithm: as many small bodies as large ones. */
  spread(low: number, high: number): number {
    return Math.exp(this.between(Math.log(low), Math.log(high)))
  }

  whole(low: number, high: number): number {
    return low + Math.floor(this.next() * (high - low + 1))
  }

  one<T>(items: readonly T[]): T {
    return items[Math.floor(this.next() * items.length)] as T
  }

  /** Near-normal: twelve uniforms, mean 0, spread 1, never beyond 6. */
  bell(): number {
    let sum = -6
    for (let i = 0; i < 12; i++) sum += this.next()
    return sum
  }
}
