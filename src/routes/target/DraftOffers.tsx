import { Button } from '../../components/ui/Button.tsx'
import { counted, formatTime } from '../../lib/numbers.ts'
import { type KeptDraft } from './useDraft.ts'

/** Unsaved text of earlier visits, offered back. */
export function DraftOffers({
  kept,
  text,
  onPut,
}: {
  kept: KeptDraft
  /** In the editor; a draft that says the same needs no offer. */
  text: string
  /** Puts a text into the editor, and says so. */
  onPut: (text: string, said: string) => void
}) {
  const shown = kept.offers.filter((draft) => draft.text !== text)
  if (shown.length === 0) return null
  return (
    <section aria-label="Unsaved drafts" className="mb-3 border-l-2 border-action py-1 pl-3">
      <ul className="flex flex-col gap-1">
        {shown.map((draft) => (
          <li key={draft.visit} className="flex flex-wrap items-center gap-x-3 gap-y-1">
            <span className="min-w-0 flex-1 basis-64">
              Unsaved draft of {formatTime(draft.at)}
              {draft.base !== null && `, from version ${draft.base}`}
              <span className="text-soft"> ({counted(draft.text.trim().split('\n').length, 'line')})</span>
            </span>
            <span className="flex gap-1">
              <Button
                onClick={() => {
                  kept.take(draft)
                  onPut(draft.text, 'The draft is in the editor.')
                }}
              >
                Go on with it
              </Button>
              <Button kind="quiet" onClick={() => kept.drop(draft)}>
                Drop it
              </Button>
            </span>
          </li>
        ))}
      </ul>
    </section>
  )
}
