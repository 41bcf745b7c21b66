/** However long its beginning took, a piece does not go on for longer than this (milliseconds). */
const longest = 30_000

/**
 * Tells when a piece of work has lasted long enough. Time counts from the first step on, and a piece lasts three times
 * as long as it took to get there: otherwise a piece that is slow to begin (a large state, a polytope to build, a
 * thread that has a small part of a busy machine) would do one step and begin again.
 *
 * @param begun when the piece began
 * @param clock milliseconds that only ever grow
 */
export function pieceLength(
  milliseconds: number,
  begun: number,
  clock = () => performance.now(),
): () => boolean {
  let end: number | null = null
  return () => {
    const now = clock()
    end ??= now + Math.max(milliseconds, Math.min(longest, 3 * (now - begun)))
    return now > end
  }
}
