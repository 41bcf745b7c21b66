import { base64Of, bytesOf } from './base64.ts'

/** Bytes of one height written as base64, as a rule. */
export const heightCodeBytes = 16 / 3

/**
 * Integer heights as base64: of 32-bit words (first character `i`) where they fit, which they do as a rule and
 * which is a third of their decimals, else of doubles (`d`).
 */
export function codeOfHeights(heights: ArrayLike<number>): string {
  const words = Int32Array.from(heights)
  for (let p = 0; p < words.length; p++) {
    if (words[p] !== heights[p]) return `d${base64Of(new Uint8Array(Float64Array.from(heights).buffer))}`
  }
  return `i${base64Of(new Uint8Array(words.buffer))}`
}

export function heightsOfCode(code: string): Float64Array {
  const { buffer } = bytesOf(code.slice(1))
  return code.startsWith('d') ? new Float64Array(buffer) : Float64Array.from(new Int32Array(buffer))
}
