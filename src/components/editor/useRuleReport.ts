import { useEffect, useRef, useState } from 'react'
import { type RuleReport } from '../../../scoring/index.ts'
import { openRuleReports, type RuleReports } from './ruleReports.ts'

/** The checker is asked when nobody has typed for this long. */
const pause = 120

export interface CheckedText {
  /** The latest report; null before the first. Its `text` may be some keys behind. */
  readonly report: RuleReport | null
  /** The report is on this very text. */
  readonly current: boolean
}

/** What the checker says of a text, worked out beside the page. */
export function useRuleReport(text: string): CheckedText {
  const reports = useRef<RuleReports | null>(null)
  const [report, setReport] = useState<RuleReport | null>(null)
  useEffect(
    () => () => {
      reports.current?.close()
      reports.current = null
    },
    [],
  )
  useEffect(() => {
    const ask = () => {
      reports.current ??= openRuleReports()
      reports.current.ask(text, setReport)
    }
    const timer = setTimeout(ask, reports.current ? pause : 0)
    return () => clearTimeout(timer)
  }, [text])
  return { report, current: report?.text === text }
}

/** Why a text cannot be saved yet; false when it can. */
export function whyUnsound({ report, current }: CheckedText): string | false {
  if (!current) return 'The rule is being checked.'
  return report?.sound ? false : 'The rule has errors; mend them first.'
}
