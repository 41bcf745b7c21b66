import { base64Of, bytesOf } from './base64.ts'

/** Bytes of one height written as base64. */
export const heightCodeBytes = 16 / 3

/** Largest size of a height that the code can carry. */
export const codedHeightBound = 2 ** 31 - 1

/** Integer heights of at most `codedHeightBound` in size as base64 of 32-bit words: a third of their decimals. */
export function codeOfHeights(heights: ArrayLike<number>): string {
  return base64Of(new Uint8Array(Int32Array.from(heights).buffer))
}

export function heightsOfCode(code: string): Float64Array {
  return Float64Array.from(new Int32Array(bytesOf(code).buffer))
}
