import { randomUUID } from 'node:crypto'
import { hostname } from 'node:os'
import { Equal, IsNull, Or } from 'typeorm'

/** How long a lease may stay without a beat before another process may take its row over. */
export const leaseMilliseconds = 30_000

/** A holder gives this many beats in that time. */
export const beatsPerLease = 3

/** Names this process in leases: machine, process number, and a word that no later process has. */
export const thisProcess = `${hostname()}/${process.pid}/${randomUUID()}`

/** The value of `leaseBeat` in an update that gives a sign of life. */
export const nextBeat = () => 'COALESCE(leaseBeat, 0) + 1'

/**
 * Condition on `leaseOwner` under which this process may take a row. What it holds already but does not work on any more
 * (a segment was committed after its search had been let go) it may always take.
 *
 * @param holder the process that left the row behind; null: the row was free
 */
export const heldBy = (holder: string | null) =>
  Or(holder === null ? IsNull() : Equal(holder), Equal(thisProcess))

/** Who works on a row; the holder counts `leaseBeat` up while it lives. */
export interface Lease {
  readonly leaseOwner: string | null
  readonly leaseBeat: number | null
}

/**
 * Tells which leases have been left behind. Clocks on the wall may jump and differ between machines, so no lease says
 * until when it lasts: whoever looks on sees the holder's beats, and measures by its own steady clock how long there
 * have been none.
 */
export class LeaseWatch {
  readonly #steadyClock: () => number
  readonly #seen = new Map<string, { readonly beat: string; readonly since: number }>()

  /** @param steadyClock milliseconds that only ever grow, whatever happens to the time of day */
  constructor(steadyClock: () => number = () => performance.now()) {
    this.#steadyClock = steadyClock
  }

  /**
   * True when nobody else works on the row: it is free, or this process's own, or its holder's process on this machine
   * has ended (so that a restart after a kill -9 goes on at once), or no beat came for as long as a lease lasts.
   */
  isFree(id: string, { leaseOwner, leaseBeat }: Lease): boolean {
    if (leaseOwner === null || leaseOwner === thisProcess) return this.#forget(id)
    const [machine, pid] = leaseOwner.split('/')
    if (machine === hostname() && !isAlive(Number(pid))) return this.#forget(id)
    const now = this.#steadyClock()
    const beat = `${leaseOwner} ${leaseBeat}`
    const seen = this.#seen.get(id)
    if (seen?.beat !== beat) {
      this.#seen.set(id, { beat, since: now })
      return false
    }
    return now - seen.since >= leaseMilliseconds ? this.#forget(id) : false
  }

  #forget(id: string): true {
    this.#seen.delete(id)
    return true
  }
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
