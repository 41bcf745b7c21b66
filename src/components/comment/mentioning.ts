export interface Named {
  readonly accountId: string
  readonly name: string
}

/** An @ before the cursor, with what has been typed of a name after it; null when none is being written. */
export function mentionAt(text: string, cursor: number): { from: number; typed: string } | null {
  const from = text.lastIndexOf('@', cursor - 1)
  if (from < 0 || (from > 0 && /[\p{L}\d]/u.test(text[from - 1] ?? ''))) return null
  const typed = text.slice(from + 1, cursor)
  return typed.length > 40 || /[\n@]/.test(typed) ? null : { from, typed }
}

/** Members whose name, or a later part of it, begins as typed. */
export function fittingMembers<Member extends Named>(members: readonly Member[], typed: string): Member[] {
  const wanted = typed.toLowerCase()
  return members.filter(({ name }) => {
    const lower = name.toLowerCase()
    return lower.startsWith(wanted) || lower.split(' ').some((part) => part.startsWith(wanted))
  })
}

/** The members that a text names. */
export const mentionedIn = (text: string, members: readonly Named[]): string[] =>
  members.filter(({ name }) => text.includes(`@${name}`)).map(({ accountId }) => accountId)

/** A text cut at the names in it, to set these apart. */
export function partsOf(text: string, names: readonly string[]): { text: string; named: boolean }[] {
  const parts: { text: string; named: boolean }[] = []
  const marks = [...names].map((name) => `@${name}`).sort((a, b) => b.length - a.length)
  let plain = ''
  for (let at = 0; at < text.length;) {
    const mark = marks.find((one) => text.startsWith(one, at))
    if (mark) {
      if (plain) parts.push({ text: plain, named: false })
      plain = ''
      parts.push({ text: mark, named: true })
      at += mark.length
    } else {
      plain += text[at]
      at += 1
    }
  }
  return plain ? [...parts, { text: plain, named: false }] : parts
}
