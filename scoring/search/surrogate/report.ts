/** What people are told of a surrogate, of one island or of several together. */
export interface SurrogateReport {
  /** Rank correlation of the latest predictions with the outcomes; null while there are too few. See `Surrogate.skill`. */
  readonly skill: number | null
  /** How many predictions that is over. */
  readonly predictions: number
  /** It had no say when this was written: too little seen, or too little skill. */
  readonly aside: boolean
  /** Proposals compared, and how many were chosen from them. */
  readonly offered: number
  readonly chosen: number
}

/**
 * Reports of islands as one: counts added up, the skill averaged with the numbers of predictions as weights; aside when
 * all are. Null when no island has a surrogate.
 */
export function mergedSurrogate(reports: readonly (SurrogateReport | null)[]): SurrogateReport | null {
  const given = reports.filter((report) => report !== null)
  if (given.length === 0) return null
  const skilled = given.filter(({ skill }) => skill !== null)
  const total = (pick: (report: SurrogateReport) => number): number =>
    given.reduce((sum, report) => sum + pick(report), 0)
  const weight = skilled.reduce((sum, { predictions }) => sum + predictions, 0)
  return {
    skill:
      weight === 0
        ? null
        : skilled.reduce((sum, { skill, predictions }) => sum + (skill ?? 0) * predictions, 0) / weight,
    predictions: total(({ predictions }) => predictions),
    aside: given.every(({ aside }) => aside),
    offered: total(({ offered }) => offered),
    chosen: total(({ chosen }) => chosen),
  }
}
