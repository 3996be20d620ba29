/** Electrons as a structure of arrays that grows as they do. Velocities in units of the speed of 1 eV; x along the field. */
export class Electrons {
  count = 0;
  capacity: number;
  x: Float64Array;
  y: Float64Array;
  z: Float64Array;
  ux: Float64Array;
  uy: Float64Array;
  uz: Float64Array;
  /** [s] up to where it has been followed */
  time: Float64Array;
  /** how many electrons it stands for; 0: gone */
  weight: Float64Array;
  cell: Int32Array;
  /** two numbers of each that tell its own stream of random numbers, where electrons have one */
  keys: Int32Array;

  constructor(capacity = 1024) {
    this.capacity = capacity;
    [this.x, this.y, this.z, this.ux, this.uy, this.uz, this.time, this.weight] = Array.from(
      { length: 8 },
      () => new Float64Array(capacity),
    ) as Columns;
    this.cell = new Int32Array(capacity);
    this.keys = new Int32Array(2 * capacity);
  }

  /** Adds an electron at rest at the origin. @returns its index */
  add(weight: number): number {
    if (this.count === this.capacity) this.grow();
    const i = this.count++;
    for (const column of this.#columns()) column[i] = 0;
    this.weight[i] = weight;
    this.cell[i] = 0;
    this.keys[2 * i] = 0;
    this.keys[2 * i + 1] = 0;
    return i;
  }

  /** Doubles the room for electrons; arrays read before are out of date. */
  grow(): void {
    this.capacity *= 2;
    const larger = this.#columns().map((column) => {
      const copy = new Float64Array(this.capacity);
      copy.set(column);
      return copy;
    }) as Columns;
    [this.x, this.y, this.z, this.ux, this.uy, this.uz, this.time, this.weight] = larger;
    const cell = new Int32Array(this.capacity);
    cell.set(this.cell);
    this.cell = cell;
    const keys = new Int32Array(2 * this.capacity);
    keys.set(this.keys);
    this.keys = keys;
  }

  /** Copies electron `from` to place `to`. */
  copy(from: number, to: number): void {
    this.x[to] = this.x[from];
    this.y[to] = this.y[from];
    this.z[to] = this.z[from];
    this.ux[to] = this.ux[from];
    this.uy[to] = this.uy[from];
    this.uz[to] = this.uz[from];
    this.time[to] = this.time[from];
    this.weight[to] = this.weight[from];
    this.cell[to] = this.cell[from];
    this.keys[2 * to] = this.keys[2 * from];
    this.keys[2 * to + 1] = this.keys[2 * from + 1];
  }

  /** Removes those that are gone; the others keep their order. */
  removeGone(): void {
    let kept = 0;
    for (let i = 0; i < this.count; i++) {
      if (this.weight[i] === 0) continue;
      if (kept < i) this.copy(i, kept);
      kept++;
    }
    this.count = kept;
  }

  totalWeight(): number {
    let sum = 0;
    for (let i = 0; i < this.count; i++) sum += this.weight[i];
    return sum;
  }

  /** Replaces the electrons by `wanted` of equal weight that stand for the same: each is kept as often as its share of the weight says, rounded up or
   *  down at random (systematic sampling, which adds the least noise). The total weight stays what it was, exactly.
   *  @param uniform  one random number in (0, 1) */
  resample(wanted: number, uniform: number): void {
    const total = this.totalWeight();
    if (!(total > 0)) throw new Error('no electrons to choose from');
    const each = total / wanted;
    while (this.capacity < this.count + wanted) this.grow();
    const first = this.count;
    let to = first;
    let sum = 0;
    for (let i = 0; i < first; i++) {
      sum += this.weight[i];
      while (to - first < wanted && (to - first + uniform) * each < sum) this.copy(i, to++);
    }
    // rounding can leave the last one out
    while (to - first < wanted) this.copy(first - 1, to++);
    for (let i = 0; i < wanted; i++) {
      this.copy(first + i, i);
      this.weight[i] = each;
    }
    this.count = wanted;
  }

  #columns(): Columns {
    return [this.x, this.y, this.z, this.ux, this.uy, this.uz, this.time, this.weight];
  }
}

type Columns = [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];
