import { medianOf, type Infeasible } from '../../scoring/index.ts'
import type { NullSummary } from '../../shared/nullSamples.ts'
import type { ScoredRow } from '../../shared/outcomes.ts'
import type { Preview } from '../../shared/targets.ts'
import { compareCandidates } from '../services/finds.ts'
import type { PreviewRow } from './nullChunk.ts'

type Stage = Infeasible['stage']

/** Stages in the order in which a rule goes through them. */
const stages: readonly Stage[] = ['polytope', 'topology', 'cone', 'metric', 'axions']

/** Rows shown of each kind. */
const shownEach = 5

export interface PreviewRequire {
  readonly label: string
  readonly stage: Stage
}

/** What a preview shows, and the candidates it names. */
export interface PreviewView {
  readonly view: Omit<Preview, 'id' | 'state' | 'message'>
  readonly shown: readonly PreviewRow[]
}

/** @param rows all candidates so far */
export function previewView(
  rows: readonly PreviewRow[],
  summary: NullSummary,
  requires: readonly PreviewRequire[],
): PreviewView {
  const ranked = [...rows].sort(compareCandidates)
  const scored = ranked.filter(({ outcome }) => outcome.kind === 'feasible')
  const best = ranked.slice(0, shownEach)
  const middle = Math.max(0, Math.floor((scored.length - shownEach) / 2))
  const typical = scored.slice(middle, middle + shownEach)
  const worst = ranked.slice(-shownEach)
  return {
    view: {
      size: summary.size,
      evaluated: summary.evaluated,
      law: summary.law,
      feasible: summary.feasible,
      infeasible: summary.infeasible,
      undefined: summary.undefined,
      undefinedReasons: undefinedReasons(rows),
      requires: requires.map((require) => passRate(require, rows)),
      histogram: summary.histogram,
      hit: summary.hit,
      cost: costOf(rows),
      best: best.map(withoutCost),
      typical: typical.map(withoutCost),
      worst: worst.map(withoutCost),
    },
    shown: [...best, ...typical, ...worst],
  }
}

/**
 * How many candidates came as far as a requirement, and how many of them met it. All requirements of a stage are
 * looked at when one of them fails; a candidate that is undefined at the stage is not counted there.
 */
function passRate(
  { label, stage }: PreviewRequire,
  rows: readonly PreviewRow[],
): Preview['requires'][number] {
  const place = stages.indexOf(stage)
  let reached = 0
  let passed = 0
  for (const { outcome } of rows) {
    const end = outcome.kind === 'feasible' ? stages.length : stages.findIndex((one) => one === outcome.stage)
    if (end < place || (end === place && outcome.kind === 'undefined')) continue
    reached += 1
    const failed = end === place && outcome.kind === 'infeasible' && outcome.failed.includes(label)
    if (!failed) passed += 1
  }
  return { label, stage, reached, passed }
}

/** The commonest first. */
function undefinedReasons(rows: readonly PreviewRow[]): Preview['undefinedReasons'] {
  const counts = new Map<string, number>()
  for (const { outcome } of rows) {
    if (outcome.kind === 'undefined') counts.set(outcome.reason, (counts.get(outcome.reason) ?? 0) + 1)
  }
  return [...counts]
    .map(([reason, count]) => ({ reason, count }))
    .sort((a, b) => b.count - a.count)
    .slice(0, 10)
}

/** Median over candidates of all stages together, and the mean of each stage, in milliseconds. */
function costOf(rows: readonly PreviewRow[]): Preview['cost'] {
  const totals = rows
    .map(({ costs }) => Object.values(costs).reduce((sum, cost) => sum + cost, 0))
    .sort((a, b) => a - b)
  const used = stages.filter((stage) => rows.some(({ costs }) => costs[stage] !== undefined))
  return {
    median: medianOf(totals),
    stages: used.map((stage) => ({
      stage,
      mean: rows.reduce((sum, { costs }) => sum + (costs[stage] ?? 0), 0) / rows.length,
    })),
  }
}

function withoutCost({ candidateKey, polytopeKey, h11, h21, outcome }: PreviewRow): ScoredRow {
  return { candidateKey, polytopeKey, h11, h21, outcome }
}
