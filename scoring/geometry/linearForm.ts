/** A linear form as text, its variables numbered from 1: [2, 0, -1] with the name x reads "2 x1 - x3". */
export function linearForm(coefficients: readonly (number | bigint)[], name: string): string {
  let text = ''
  coefficients.forEach((coefficient, i) => {
    const entry = BigInt(coefficient)
    if (entry === 0n) return
    const sign = entry < 0n ? (text === '' ? '-' : ' - ') : text === '' ? '' : ' + '
    const size = entry < 0n ? -entry : entry
    text += `${sign}${size === 1n ? '' : `${size} `}${name}${i + 1}`
  })
  return text === '' ? '0' : text
}
