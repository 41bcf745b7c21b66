import { base64Of, bytesOf } from './base64.ts'

/** How a class fared under the rule, in the two numbers that order candidates; see `merit.ts`. */
export interface Seen {
  readonly kind: number
  readonly value: number
}

/** A table as it stands in a state: plain JSON, little-endian arrays in base64. */
export interface SeenTableState {
  readonly capacity: number
  readonly used: number
  readonly turn: number
  readonly keys: string
  readonly values: string
  readonly kinds: string
}

/** Slots of one bucket: a key lives in one of these, wherever its bucket is. */
const bucket = 8

/** Bytes of one slot once it is written as base64: key 8, value 8, kind 1. */
export const seenSlotBytes = (17 * 4) / 3

/**
 * The classes a run has scored, as far as a table of fixed size knows: 64-bit keys with the merit that the class
 * was found to have. A key lives in its bucket of eight slots; when all are taken, the oldest turn is
 * overwritten, and the class counts as new should it come again. Filled to one half, hardly any bucket overflows.
 *
 * Two classes with the same 64 bits would be taken for one: among a million classes, with probability 3e-8.
 */
export class SeenTable {
  readonly capacity: number
  private entries: number
  private turn: number
  /** Two 32-bit words per slot. */
  private readonly keys: Uint32Array
  private readonly values: Float64Array
  /** 0: empty slot. */
  private readonly kinds: Uint8Array

  /** @param capacity a power of two, at least 8 */
  constructor(capacity: number) {
    this.capacity = capacity
    this.entries = 0
    this.turn = 0
    this.keys = new Uint32Array(2 * capacity)
    this.values = new Float64Array(capacity)
    this.kinds = new Uint8Array(capacity)
  }

  static restore(state: SeenTableState): SeenTable {
    const table = new SeenTable(state.capacity)
    table.entries = state.used
    table.turn = state.turn
    readInto(table.keys, state.keys)
    readInto(table.values, state.values)
    readInto(table.kinds, state.kinds)
    return table
  }

  state(): SeenTableState {
    return {
      capacity: this.capacity,
      used: this.entries,
      turn: this.turn,
      keys: base64OfArray(this.keys),
      values: base64OfArray(this.values),
      kinds: base64OfArray(this.kinds),
    }
  }

  /** Number of slots in use. */
  get used(): number {
    return this.entries
  }

  /** What is known of the class with these two key words, or null. */
  find(high: number, low: number): Seen | null {
    const slot = this.slotOf(high, low)
    return slot < 0 ? null : { kind: this.kinds[slot], value: this.values[slot] }
  }

  /** Writes a class that `find` does not know. `kind` is 1 to 255. */
  add(high: number, low: number, kind: number, value: number): void {
    const start = this.bucketOf(high, low)
    let slot = -1
    for (let s = start; s < start + bucket; s++) {
      if (this.kinds[s] === 0) {
        slot = s
        this.entries++
        break
      }
    }
    if (slot < 0) {
      slot = start + this.turn
      this.turn = (this.turn + 1) % bucket
    }
    this.keys[2 * slot] = high
    this.keys[2 * slot + 1] = low
    this.values[slot] = value
    this.kinds[slot] = kind
  }

  /** The same classes in a table of at least so many slots. */
  grown(capacity: number): SeenTable {
    if (capacity <= this.capacity) return this
    const table = new SeenTable(capacity)
    for (let slot = 0; slot < this.capacity; slot++)
      if (this.kinds[slot] !== 0)
        table.add(this.keys[2 * slot], this.keys[2 * slot + 1], this.kinds[slot], this.values[slot])
    return table
  }

  private bucketOf(high: number, low: number): number {
    return (((high ^ (low >>> 7)) >>> 0) % (this.capacity / bucket)) * bucket
  }

  private slotOf(high: number, low: number): number {
    const start = this.bucketOf(high, low)
    for (let s = start; s < start + bucket; s++) {
      if (this.kinds[s] !== 0 && this.keys[2 * s] === high && this.keys[2 * s + 1] === low) return s
    }
    return -1
  }
}

/**
 * The 64 bits by which a class is remembered: the first 16 hexadecimal digits of its key, with those of its
 * polytope's key folded in, as two unsigned words.
 */
export function seenKey(polytopeKey: string, classKey: string): [number, number] {
  const word = (key: string, at: number): number => parseInt(key.slice(at, at + 8), 16)
  return [(word(classKey, 0) ^ word(polytopeKey, 0)) >>> 0, (word(classKey, 8) ^ word(polytopeKey, 8)) >>> 0]
}

type Words = Uint8Array | Uint32Array | Float64Array

/** In the machine's byte order, which is little-endian wherever Node and browsers run today. */
function base64OfArray(array: Words): string {
  return base64Of(new Uint8Array(array.buffer, array.byteOffset, array.byteLength))
}

function readInto(array: Words, text: string): void {
  const bytes = bytesOf(text)
  if (bytes.length !== array.byteLength) throw new RangeError('a table of classes seen has the wrong size')
  new Uint8Array(array.buffer).set(bytes)
}
