/** A column of doubles that grows: a plain array would box them once one is a hole, and doubles the memory. */
export class NumberColumn {
  #values = new Float64Array(1_024)
  #length = 0

  push(value: number): void {
    if (this.#length === this.#values.length) {
      const larger = new Float64Array(this.#values.length * 2)
      larger.set(this.#values)
      this.#values = larger
    }
    this.#values[this.#length++] = value
  }

  get length(): number {
    return this.#length
  }

  last(): number {
    return this.#length === 0 ? Number.NaN : (this.#values[this.#length - 1] ?? Number.NaN)
  }

  at(index: number): number {
    return this.#values[index] ?? Number.NaN
  }

  set(index: number, value: number): void {
    if (index < this.#length) this.#values[index] = value
  }

  pop(): void {
    if (this.#length > 0) this.#length--
  }

  toArray(): Float64Array {
    return this.#values.slice(0, this.#length)
  }
}
