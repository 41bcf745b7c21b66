import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { scoringHash } from '../rules/hash.ts'
import { ruleOfInput } from '../evaluation/input.ts'
import { compareMerits, type Merit } from '../search/merit.ts'
import { nullLaws, type NullLawName } from '../search/nullLaws.ts'
import { engineVersion } from '../version.ts'
import type { BenchThreads } from './benchThreads.ts'
import type { SearchTask } from './searchTasks.ts'

/** Portions of a null sample, each with a seed of its own, so that several threads can draw it. */
const portionSize = 250
const firstSeed = 2 ** 20

const folder = fileURLToPath(new URL('../../var/bench/', import.meta.url))

/**
 * The merits of `size` distinct null candidates of a task, best first: independent portions taken together, each class
 * counted once. They are kept in files under var/bench, by task, scoring hash and law, because they take
 * minutes at h11 = 491.
 */
export async function nullMerits(
  task: SearchTask,
  size: number,
  threads: BenchThreads,
  law: NullLawName,
): Promise<readonly Merit[]> {
  const hash = scoringHash(ruleOfInput(task.rule), engineVersion)
  const portions = await Promise.all(
    Array.from({ length: Math.ceil(size / portionSize) }, async (_, portion) => {
      const path = `${folder}null-${task.name}-${nullLaws[law].name.replace('/', '-')}-${hash.slice(0, 16)}-${portion}.json`
      const kept = readPortion(path)
      if (kept !== undefined) return kept
      const { merits, classKeys } = await threads.run({
        task: task.name,
        method: 'random',
        law,
        seed: firstSeed + portion,
        budget: portionSize,
      })
      const drawn = merits.map(({ kind, value }, n) => [classKeys[n].slice(0, 16), kind, value] as const)
      mkdirSync(folder, { recursive: true })
      // Renamed into place, so that a broken write is never read.
      writeFileSync(`${path}.part`, JSON.stringify(drawn))
      renameSync(`${path}.part`, path)
      return drawn
    }),
  )
  const distinct = new Map(portions.flat().map(([key, kind, value]) => [key, { kind, value }]))
  return [...distinct.values()].slice(0, size).sort(compareMerits)
}

type Portion = readonly (readonly [key: string, kind: number, value: number])[]

function readPortion(path: string): Portion | undefined {
  try {
    return JSON.parse(readFileSync(path, 'utf8')) as Portion
  } catch {
    return undefined
  }
}
