import { useId, useRef, useState, type KeyboardEvent } from 'react'
import { commentLimit } from '../../../shared/comments.ts'
import { Button } from '../ui/Button.tsx'
import { Field } from '../ui/Field.tsx'
import { fittingMembers, mentionAt, mentionedIn, type Named } from './mentioning.ts'

/** Where a comment is written: an @ completes the names of members; Ctrl Enter sends. */
export function CommentBox({
  label,
  members,
  initial = '',
  send,
  onSend,
  onCancel,
  busy,
  unavailable,
}: {
  label: string
  members: readonly Named[]
  initial?: string
  send: string
  onSend: (text: string, mentions: string[], done: () => void) => void
  onCancel?: () => void
  busy: boolean
  unavailable?: string | false
}) {
  const [text, setText] = useState(initial)
  const [cursor, setCursor] = useState(0)
  const [closed, setClosed] = useState(false)
  const [marked, setMarked] = useState(0)
  const area = useRef<HTMLTextAreaElement>(null)
  const listId = useId()
  const open = closed ? null : mentionAt(text, cursor)
  const fitting = open ? fittingMembers(members, open.typed).slice(0, 8) : []
  const at = Math.min(marked, fitting.length - 1)
  const complete = ({ name }: Named) => {
    if (!open) return
    const before = `${text.slice(0, open.from)}@${name} `
    setText(before + text.slice(cursor).replace(/^ /, ''))
    setCursor(before.length)
    setClosed(true)
    requestAnimationFrame(() => area.current?.setSelectionRange(before.length, before.length))
  }
  const submit = () => {
    const plain = text.trim()
    if (plain !== '' && !unavailable) onSend(plain, mentionedIn(plain, members), () => setText(''))
  }
  const onKeyDown = (event: KeyboardEvent) => {
    const chosen = fitting[at]
    if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) submit()
    else if (chosen && (event.key === 'Enter' || event.key === 'Tab')) complete(chosen)
    else if (chosen && event.key === 'ArrowDown') setMarked((at + 1) % fitting.length)
    else if (chosen && event.key === 'ArrowUp') setMarked((at + fitting.length - 1) % fitting.length)
    else if (chosen && event.key === 'Escape') setClosed(true)
    else return
    event.preventDefault()
    event.stopPropagation()
  }
  return (
    <form
      className="max-w-[70ch]"
      onSubmit={(event) => {
        event.preventDefault()
        submit()
      }}
    >
      <div className="relative">
        <Field label={label} hint="Plain text. @ names a member, who finds it on the campaign’s page.">
          {(field) => (
            <textarea
              {...field}
              ref={area}
              aria-autocomplete="list"
              aria-haspopup="listbox"
              aria-controls={listId}
              aria-activedescendant={fitting.length > 0 ? `${listId}-${at}` : undefined}
              rows={3}
              maxLength={commentLimit}
              disabled={Boolean(unavailable)}
              title={unavailable || undefined}
              className={`${field.className} py-1.5`}
              value={text}
              onChange={(event) => {
                setText(event.target.value)
                setCursor(event.target.selectionStart)
                setClosed(false)
                setMarked(0)
              }}
              onSelect={(event) => setCursor(event.currentTarget.selectionStart)}
              onBlur={() => setClosed(true)}
              onKeyDown={onKeyDown}
            />
          )}
        </Field>
        <ul
          id={listId}
          role="listbox"
          aria-label="Members"
          hidden={fitting.length === 0}
          className="absolute top-full left-0 z-20 min-w-48 border border-edge bg-sheet shadow-lifted"
        >
          {fitting.map((member, place) => (
            <li
              key={member.accountId}
              id={`${listId}-${place}`}
              role="option"
              aria-selected={place === at}
              className={`min-h-8 cursor-pointer px-3 leading-8 ${place === at ? 'bg-action-wash' : ''}`}
              onPointerDown={(event) => {
                event.preventDefault()
                complete(member)
              }}
            >
              {member.name}
            </li>
          ))}
        </ul>
      </div>
      <div className="mt-2 flex gap-2">
        <Button
          type="submit"
          busy={busy}
          unavailable={unavailable || (text.trim() === '' && 'Nothing has been written yet.')}
        >
          {send}
        </Button>
        {onCancel && (
          <Button kind="quiet" onClick={onCancel}>
            Cancel
          </Button>
        )}
      </div>
    </form>
  )
}
