/** A message cut at its backticks: alternately plain words and code. */
export function codeParts(message: string): { text: string; code: boolean }[] {
  return message
    .split('`')
    .map((text, index) => ({ text, code: index % 2 === 1 }))
    .filter(({ text }) => text !== '')
}
