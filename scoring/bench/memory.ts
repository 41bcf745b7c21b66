import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { candidateOf, largest, workload } from './workloads.ts'

const inChild = '--measure-memory'

/**
 * Peak memory in MB that a whole evaluation at h11 = 491 (both spectra included) takes above the idle process,
 * measured in a child process of its own.
 */
export function evaluationMemory(): number {
  const args = ['--import', 'tsx', fileURLToPath(import.meta.url), inChild]
  const child = spawnSync(process.execPath, args, { encoding: 'utf8' })
  const megabytes = Number(child.stdout)
  if (child.status !== 0 || !(megabytes > 0)) throw new Error(`The memory bench failed: ${child.stderr}`)
  return megabytes
}

if (process.argv[2] === inChild) {
  const idle = process.resourceUsage().maxRSS
  const candidate = candidateOf(workload(largest).form, 1)
  candidate.topEigenvalue()
  candidate.divisorSpectrum()
  candidate.basisSpectrum()
  process.stdout.write(String((process.resourceUsage().maxRSS - idle) / 1024))
}
