import { readFileSync } from 'node:fs'
import { ruleOfInput } from '../evaluation/input.ts'
import { polytopeFromPoints } from '../geometry/polytope.ts'
import { normalForm } from '../geometry/normalForm.ts'
import type { SearchProblem } from '../search/problem.ts'
import { polytopeSource, type PolytopeEntry } from '../search/polytopeSource.ts'

/** One task of the search bench: a rule over a scope of bundled polytopes. */
export interface SearchTask {
  readonly name: string
  /** Where and what, for people. */
  readonly title: string
  readonly rule: string
  /** Ids of bundled polytopes, or all of the small ones with this h11. */
  readonly scope: readonly string[] | { readonly h11: number }
  /** True where auto must beat random by the stated factor: h11 of at least 50. */
  readonly demanding: boolean
  /** Evaluations at the beginning of each run that are looked at. */
  readonly watched: number
  /** Left out by `--quick`. */
  readonly slow?: true
  /** A budget that is enough for all candidates: auto must find out that they can be enumerated. */
  readonly enumerable?: number
}

const top = 'score log10(metric.divisor.top)'

/** Budget of every run, of which only the beginning is watched: how people search, not how a bench would. */
export const taskBudget = 1000

/** The fixed tasks of `npm run bench:search`. */
export const searchTasks: readonly SearchTask[] = [
  {
    name: 'top-20',
    title: 'metric.divisor.top at (20, 17)',
    rule: top,
    scope: ['w20-17-newton-4-4-5-5-7'],
    demanding: false,
    watched: 100,
  },
  {
    name: 'top-20-few',
    title: 'metric.divisor.top at (20, 20), where there are 192 classes',
    rule: top,
    scope: ['w20-20-fan-3-5-6-7-7'],
    demanding: false,
    watched: 100,
    enumerable: taskBudget,
  },
  {
    name: 'top-50',
    title: 'metric.divisor.top at (50, 7)',
    rule: top,
    scope: ['w50-7-newton-2-2-3-3-7'],
    demanding: true,
    watched: 100,
  },
  {
    name: 'top-100',
    title: 'metric.divisor.top at (100, 10)',
    rule: top,
    scope: ['w100-10-newton-1-2-5-5-13'],
    demanding: true,
    watched: 100,
  },
  {
    name: 'top-251',
    title: 'metric.divisor.top at (251, 5)',
    rule: top,
    scope: ['w251-5-newton-1-1-3-10-15'],
    demanding: true,
    watched: 30,
    slow: true,
  },
  {
    name: 'top-491',
    title: 'metric.divisor.top at (491, 11)',
    rule: top,
    scope: ['w491-11-newton-1-1-12-28-42'],
    demanding: true,
    watched: 30,
    slow: true,
  },
  {
    name: 'basis-50',
    title: 'metric.basis.top at (50, 7)',
    rule: 'score log10(metric.basis.top)',
    scope: ['w50-7-newton-2-2-3-3-7'],
    demanding: true,
    watched: 100,
  },
  {
    name: 'pattern-100',
    title: 'pairs of rigid divisors that meet in a curve of type (-1, -1), at (100, 10)',
    rule: 'score count(p in pairs where p.aab == -1 and p.abb == -1 : p.a.rigid and p.b.rigid)',
    scope: ['w100-10-newton-1-2-5-5-13'],
    demanding: true,
    watched: 100,
  },
  {
    name: 'mixed-50',
    title: 'metric.divisor.top at volume 1000 with two requirements, at (50, 7)',
    rule: [
      'at volume 1000',
      'require min(d in divisors : d.volume) >= 0.2 label "no small cycle"',
      'require count(p in pairs : p.aab == -1 and p.abb == -1) >= 160 label "many walls"',
      'score log10(metric.divisor.top)',
    ].join('\n'),
    scope: ['w50-7-newton-2-2-3-3-7'],
    demanding: true,
    watched: 100,
  },
  {
    name: 'small-scope',
    title: 'metric.divisor.top over the 1,197 polytopes with h11 = 4',
    rule: top,
    scope: { h11: 4 },
    demanding: false,
    watched: 100,
    enumerable: 2000,
  },
]

interface Bundled {
  readonly id: string
  readonly vertices: readonly (readonly number[])[]
  readonly h11: number
}

function bundled(file: 'large' | 'small'): readonly Bundled[] {
  const path = new URL(`../../server/library/data/polytopes-${file}.json`, import.meta.url)
  return (JSON.parse(readFileSync(path, 'utf8')) as { polytopes: Bundled[] }).polytopes
}

/** The task's scope and rule, ready to be searched. */
export function taskScope({ scope, rule }: SearchTask): Pick<SearchProblem, 'polytopes' | 'rule'> {
  const chosen =
    'h11' in scope
      ? bundled('small').filter(({ h11 }) => h11 === scope.h11)
      : scope.map((id) => bundled('large').find((polytope) => polytope.id === id) ?? missing(id))
  const entries: PolytopeEntry[] = chosen.map(({ vertices }) => ({
    key: normalForm(polytopeFromPoints(vertices)).key,
    vertices,
  }))
  return { polytopes: polytopeSource(entries), rule: ruleOfInput(rule) }
}

function missing(id: string): never {
  throw new Error(`There is no bundled polytope ${id}.`)
}
