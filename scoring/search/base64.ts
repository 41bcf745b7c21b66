const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'

const digitOf = new Uint8Array(128).fill(255)
for (let d = 0; d < 64; d++) digitOf[alphabet.charCodeAt(d)] = d

const pairs: string[] = []
for (let p = 0; p < 4096; p++) pairs.push(alphabet[p >> 6] + alphabet[p & 63])

/** Bytes as base64 (RFC 4648, padded): how typed arrays travel inside a state, which is plain JSON. */
export function base64Of(bytes: Uint8Array): string {
  const parts: string[] = []
  const whole = bytes.length - (bytes.length % 3)
  for (let i = 0; i < whole; i += 3) {
    const word = (bytes[i] << 16) | (bytes[i + 1] << 8) | bytes[i + 2]
    parts.push(pairs[word >> 12], pairs[word & 4095])
  }
  const rest = bytes.length - whole
  if (rest > 0) {
    const word = (bytes[whole] << 16) | (rest === 2 ? bytes[whole + 1] << 8 : 0)
    parts.push(pairs[word >> 12], rest === 2 ? alphabet[(word >> 6) & 63] + '=' : '==')
  }
  return parts.join('')
}

/**
 * The bytes of a base64 text.
 * @throws RangeError when the text is not base64
 */
export function bytesOf(text: string): Uint8Array {
  if (text.length % 4 !== 0) throw new RangeError('not base64: the length is no multiple of 4')
  const padding = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0
  const bytes = new Uint8Array((text.length / 4) * 3 - padding)
  let at = 0
  for (let i = 0; i < text.length; i += 4) {
    let word = 0
    for (let n = 0; n < 4; n++) {
      const last = i + n >= text.length - padding
      const digit = last ? 0 : (digitOf[text.charCodeAt(i + n)] ?? 255)
      if (digit === 255) throw new RangeError(`not base64: character ${i + n}`)
      word = (word << 6) | digit
    }
    for (let shift = 16; shift >= 0 && at < bytes.length; shift -= 8) bytes[at++] = (word >> shift) & 255
  }
  return bytes
}
