import { useRef } from 'react'
import { useQueryClient } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type ShortlistDetail, type ShortlistRow } from '../../../shared/shortlists.ts'
import {
  verdictWord,
  type Reader,
  type Verdict,
  type VerdictsGiven,
  type VerdictValue,
} from '../../../shared/verdicts.ts'
import { explain } from '../../api/request.ts'
import { useSession } from '../../api/session.ts'
import { placeVerdicts, sendVerdicts, showSent, undoVerdicts } from '../../api/verdicts.ts'
import { useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { counted } from '../../lib/numbers.ts'

interface Given {
  readonly words: string
  readonly first: string
  /** Identifiers of the entries; none where the server refused. */
  readonly ids: Promise<readonly string[]>
}

export interface Decisions {
  /** Shows the verdict at once and sends it; what is refused goes back and is named. */
  decide(rows: readonly ShortlistRow[], value: VerdictValue, reason?: string): void
  /** Takes back the last decision that was not taken back yet. */
  undo(): void
}

const mostNamed = 3

/** Verdicts on rows of a list, one or many, and taking them back one after the other. */
export function useDecisions(
  campaign: string,
  list: ShortlistDetail,
  onCurrent: (key: string) => void,
): Decisions {
  const client = useQueryClient()
  const session = useSession()
  const twoReaders = useCurrentCampaign()?.secondReader ?? false
  const given = useRef<Given[]>([])
  const me: Reader = session.data?.account ?? { id: '', name: '' }

  const nameOf = (key: string) => {
    const row = list.rows.find(({ candidateKey }) => candidateKey === key)
    return row ? `rank ${row.rank} (${row.polytopeName})` : key.slice(0, 10)
  }
  const tellRefused = (refused: VerdictsGiven['refused'], what: string) => {
    const [first] = refused
    if (!first) return
    const named = refused.slice(0, mostNamed).map(({ candidateKey }) => nameOf(candidateKey))
    const more = refused.length > mostNamed ? ` and ${refused.length - mostNamed} more` : ''
    toast.error(`${what} ${named.join(', ')}${more}: ${first.message}`, {
      duration: 15_000,
      action: { label: 'Go to it', onClick: () => onCurrent(first.candidateKey) },
    })
  }
  const settle = ({ given: done }: VerdictsGiven) => {
    placeVerdicts(client, done)
    void client.invalidateQueries({ queryKey: ['campaign', campaign] })
    void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
    void client.invalidateQueries({ queryKey: ['candidate-record', campaign] })
  }

  const takeBack = async (entry: Given) => {
    given.current = given.current.filter((other) => other !== entry)
    const ids = await entry.ids
    if (ids.length === 0) return
    try {
      const answer = await undoVerdicts(campaign, ids)
      settle(answer)
      if (answer.given.length > 0) {
        onCurrent(entry.first)
        toast(`Taken back: ${entry.words}.`)
      }
      tellRefused(answer.refused, 'Not taken back for')
    } catch (error) {
      given.current = [...given.current, entry]
      toast.error(`Not taken back: ${entry.words}. ${explain(error)}`)
    }
  }

  return {
    decide(rows, value, reason = '') {
      const [first] = rows
      if (!first) return
      const keys = rows.map(({ candidateKey }) => candidateKey)
      const draft = (before: Verdict | null): Omit<Verdict, 'id'> => ({
        value,
        reason,
        override: value === 'verified' && reason !== '',
        certificateId: null,
        author: me.name,
        readers: twoReaders && value === 'verified' ? readersNow(before, me, list.targetVersion) : null,
        undoneBy: null,
        createdAt: new Date().toISOString(),
        targetId: list.targetId,
        targetName: list.targetName,
        targetVersion: list.targetVersion,
      })
      const word = verdictWord(draft(first.verdict))
      const words = rows.length === 1 ? `rank ${first.rank}, ${word}` : `${rows.length} candidates, ${word}`
      const shown = showSent(client, keys, draft)
      const sending = sendVerdicts(campaign, {
        targetVersionId: list.targetVersionId,
        value,
        reason,
        candidateKeys: keys,
      })
      const ids = sending.then(
        (answer) => {
          shown.takeBack(answer.refused.map(({ candidateKey }) => candidateKey))
          settle(answer)
          tellRefused(answer.refused, `Not ${value}:`)
          return answer.given.map(({ verdict }) => verdict.id)
        },
        (error: unknown) => {
          shown.takeBack(keys)
          tellRefused(
            keys.map((candidateKey) => ({ candidateKey, code: '', message: explain(error) })),
            `Not ${value}:`,
          )
          return []
        },
      )
      const entry: Given = { words, first: first.candidateKey, ids }
      given.current = [...given.current, entry]
      void ids.then((made) => {
        if (made.length === 0) given.current = given.current.filter((other) => other !== entry)
        else
          toast(capital(rows.length === 1 ? words : `${counted(made.length, 'candidate')}, ${word}`), {
            action: { label: 'Undo', onClick: () => void takeBack(entry) },
          })
      })
    },
    undo() {
      const last = given.current.at(-1)
      if (last) void takeBack(last)
      else toast('Nothing to take back: no verdict was given here since the page was opened.')
    },
  }
}

const capital = (words: string) => words[0].toUpperCase() + words.slice(1)

/** As the server will count; its answer replaces this. */
function readersNow(before: Verdict | null, me: Reader, targetVersion: number): Reader[] {
  if (before?.value !== 'verified' || before.targetVersion !== targetVersion) return [me]
  const known = before.readers ?? [{ id: before.author === me.name ? me.id : '', name: before.author }]
  return [...known.filter(({ id }) => id !== me.id), me]
}
