/**
 * Thread time that a member may have fallen behind its siblings and still make up for (milliseconds). More is forfeit:
 * who could not use what was offered must not keep the others waiting for long afterwards.
 */
export const creditMilliseconds = 5_000

/** One side of a division: a campaign, a kind of work, or a single run. */
class Member {
  /** Thread time of pieces that have ended (milliseconds), moved up when the member comes in or lets turns go by. */
  used = 0
  /** When the pieces in hand began. */
  readonly inHand: number[] = []
  /** Number of the turn in which it was served last. */
  turn = 0

  usedBy(now: number): number {
    return this.inHand.reduce((sum, since) => sum + now - since, this.used)
  }
}

/** Divides thread time equally among its members: the one that has had least is next. */
export class FairShares<Key> {
  readonly #members = new Map<Key, Member>()

  /**
   * A member that comes in stands level with the one that has had least: it brings neither a claim for the time before
   * nor, if it was here earlier and ahead of the others, a clean slate.
   *
   * @param present the members that have work now; a member that left is remembered, but nobody is measured by it
   */
  join(key: Key, present: Iterable<Key>, now: number): void {
    const standings = [...present].flatMap((other) => {
      const member = this.#members.get(other)
      return member && other !== key ? [member.usedBy(now)] : []
    })
    const member = this.#member(key)
    if (standings.length > 0) member.used = Math.max(member.used, Math.min(...standings))
  }

  forget(key: Key): void {
    this.#members.delete(key)
  }

  /** Members by the time they have had, least first; among equals the one served longest ago. */
  order(keys: Iterable<Key>, now: number): Key[] {
    return [...keys]
      .map((key) => ({ key, member: this.#member(key) }))
      .map(({ key, member }) => ({ key, used: member.usedBy(now), turn: member.turn }))
      .sort((a, b) => a.used - b.used || a.turn - b.turn)
      .map(({ key }) => key)
  }

  usedBy(key: Key, now: number): number {
    return this.#member(key).usedBy(now)
  }

  /** A piece of `key` begins; `passed` had nothing to do with the turn, and keep no more than a limited claim. */
  begin(key: Key, passed: readonly Key[], now: number, turn: number): void {
    const member = this.#member(key)
    const least = member.usedBy(now) - creditMilliseconds
    for (const other of passed) {
      const idle = this.#member(other)
      idle.used += Math.max(0, least - idle.usedBy(now))
    }
    member.turn = turn
    member.inHand.push(now)
  }

  /** The piece of `key` that began at `since` has ended. */
  end(key: Key, since: number, now: number): void {
    const member = this.#members.get(key)
    if (!member) return
    const piece = member.inHand.indexOf(since)
    // Begun before the member was forgotten and came again.
    if (piece < 0) return
    member.inHand.splice(piece, 1)
    member.used += now - since
  }

  #member(key: Key): Member {
    let member = this.#members.get(key)
    if (!member) this.#members.set(key, (member = new Member()))
    return member
  }
}
