import { randomUUID } from 'node:crypto'
import { hostname } from 'node:os'

/** How long a search may be without a sign of life before another process may take it over. */
export const leaseMilliseconds = 30_000

/** Names this process in leases: machine, process number, and a word that no later process has. */
export const thisProcess = `${hostname()}/${process.pid}/${randomUUID()}`

/**
 * True when the lease's holder can be taken for gone: it has run out, or its process on this machine has ended.
 * After a kill -9 a restarted server thus goes on at once.
 */
export function isFree(lease: {
  readonly leaseOwner: string | null
  readonly leaseUntil: number | null
}): boolean {
  const { leaseOwner, leaseUntil } = lease
  if (leaseOwner === null || leaseOwner === thisProcess) return true
  if (leaseUntil === null || leaseUntil < Date.now()) return true
  const [machine, pid] = leaseOwner.split('/')
  return machine === hostname() && !isAlive(Number(pid))
}

function isAlive(pid: number): boolean {
  if (pid === process.pid) return false // An earlier process with our number: it cannot be alive beside us.
  try {
    process.kill(pid, 0)
    return true
  } catch (error) {
    return error instanceof Error && 'code' in error && error.code === 'EPERM'
  }
}
