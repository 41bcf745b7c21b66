const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/'

const codes = Uint8Array.from(alphabet, (digit) => digit.charCodeAt(0))

const digitOf = new Uint8Array(128).fill(255)
for (let d = 0; d < 64; d++) digitOf[codes[d]] = d

const padding = '='.charCodeAt(0)

/** Bytes as base64 (RFC 4648, padded): how typed arrays travel inside a state, which is plain JSON. */
export function base64Of(bytes: Uint8Array): string {
  const text = new Uint8Array(4 * Math.ceil(bytes.length / 3))
  let at = 0
  for (let i = 0; i < bytes.length; i += 3) {
    // Beyond the end undefined becomes 0; padding then replaces what it gave.
    const word = (bytes[i] << 16) | (bytes[i + 1] << 8) | bytes[i + 2]
    text[at++] = codes[word >> 18]
    text[at++] = codes[(word >> 12) & 63]
    text[at++] = codes[(word >> 6) & 63]
    text[at++] = codes[word & 63]
  }
  const rest = bytes.length % 3
  if (rest > 0) text[at - 1] = padding
  if (rest === 1) text[at - 2] = padding
  return new TextDecoder().decode(text)
}

/**
 * The bytes of a base64 text.
 * @throws RangeError when the text is not base64
 */
export function bytesOf(text: string): Uint8Array {
  if (text.length % 4 !== 0) throw new RangeError('not base64: the length is no multiple of 4')
  const padded = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0
  const bytes = new Uint8Array((text.length / 4) * 3 - padded)
  let at = 0
  for (let i = 0; i < text.length; i += 4) {
    let word = 0
    for (let n = i; n < i + 4; n++) {
      const digit = n < text.length - padded ? (digitOf[text.charCodeAt(n)] ?? 255) : 0
      if (digit === 255) throw new RangeError(`not base64: character ${n}`)
      word = (word << 6) | digit
    }
    for (let shift = 16; shift >= 0 && at < bytes.length; shift -= 8) bytes[at++] = (word >> shift) & 255
  }
  return bytes
}
