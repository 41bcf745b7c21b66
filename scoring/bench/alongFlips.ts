import { checkRule } from '../rules/check.ts'
import { Motion } from '../search/lines/motion.ts'
import { directionLaws } from '../search/lines/lineDirections.ts'
import { RandomStream, seededState } from '../search/randomStream.ts'
import { drawNull } from '../search/sampling.ts'
import type { NormalForm } from '../geometry/normalForm.ts'

/** Classes of one measurement at least. */
const classes = 2000

/**
 * Milliseconds per thousand classes of a topological rule along random lines of heights: walls, numbers, identity
 * and ranking of every class met, the beginnings of lines included.
 *
 * @param time runs the work and gives its milliseconds
 */
export function alongFlips(
  form: NormalForm,
  ruleText: string,
  seed: number,
  time: (work: () => void) => number,
): number {
  const checked = checkRule(ruleText)
  if (!checked.ok) throw new Error(checked.issues[0].message)
  const stream = new RandomStream(seededState(seed))
  const motion = new Motion(form, checked.rule, drawNull(form.polytope, stream))
  let met = 0
  let spent = 0
  while (met < classes) {
    const law = directionLaws[directionLaws.length - 1]
    const direction = law(form.polytope, motion.heights, stream)
    spent += time(() => {
      const start = motion.checkpoint()
      motion.aim(direction)
      for (let n = 0; n < 400 && motion.cross(); n++) {
        motion.words()
        if (motion.outcome() === undefined) throw new Error('the rule does not follow the motion')
        met++
      }
      const end = motion.checkpoint() ?? start
      if (end !== undefined) motion.goBack(end)
    })
  }
  return (1000 * spent) / met
}
