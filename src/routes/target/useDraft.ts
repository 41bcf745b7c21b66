import { useCallback, useEffect, useRef, useState } from 'react'
import { dropDraft, draftsAt, keepDraft, type Draft } from './drafts.ts'

/** A draft is written when nobody has typed for this long, and when the page goes away. */
const pause = 400

export interface KeptDraft {
  /** Drafts of earlier visits that differ from the text in the editor, newest first, until they are answered. */
  readonly offers: readonly Draft[]
  /** Takes an offer off the list; its text is the caller's then. */
  readonly take: (draft: Draft) => void
  /** Throws an offer away. */
  readonly drop: (draft: Draft) => void
  /** Throws away what this visit has kept. */
  readonly forget: () => void
  /** Keeps a text that is about to be replaced, apart from the one that is typed. */
  readonly setAside: (text: string) => void
}

/**
 * Keeps unsaved text in this browser, so that neither a crash nor a closed tab loses it.
 *
 * @param place a target's id, or what stands for a target not yet saved
 * @param saved the text that needs no keeping
 */
export function useDraft(place: string, text: string, saved: string, base: number | null): KeptDraft {
  const [visit] = useState(() => crypto.randomUUID())
  const [offers, setOffers] = useState<readonly Draft[]>(() =>
    draftsAt(place).filter((draft) => draft.text !== saved),
  )
  const write = useRef<(() => void) | null>(null)
  useEffect(() => {
    const now = () => {
      if (write.current !== now) return
      write.current = null
      if (text === saved) dropDraft(place, visit)
      else keepDraft(place, { visit, text, base, at: new Date().toISOString() })
    }
    write.current = now
    const timer = setTimeout(now, pause)
    return () => clearTimeout(timer)
  }, [place, visit, text, saved, base])
  useEffect(() => {
    const flush = () => write.current?.()
    window.addEventListener('pagehide', flush)
    return () => {
      window.removeEventListener('pagehide', flush)
      flush()
    }
  }, [])
  const remove = useCallback(
    (draft: Draft) => {
      dropDraft(place, draft.visit)
      setOffers((all) => all.filter((one) => one !== draft))
    },
    [place],
  )
  const forget = useCallback(() => {
    write.current = null
    dropDraft(place, visit)
  }, [place, visit])
  const setAside = useCallback(
    (replaced: string) => {
      const draft = { visit: crypto.randomUUID(), text: replaced, base, at: new Date().toISOString() }
      keepDraft(place, draft)
      setOffers((all) => [draft, ...all])
    },
    [place, base],
  )
  return { offers, take: remove, drop: remove, forget, setAside }
}
