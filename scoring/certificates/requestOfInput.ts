import { InputError } from '../errors.ts'
import { evaluationInputSchema, heightsOfInput, parsedInput, polytopeOfInput } from '../evaluation/input.ts'
import { canonicalClass } from '../geometry/classKey.ts'
import { isGeneric } from '../geometry/circuits.ts'
import { genericWitness } from '../geometry/genericWitness.ts'
import { normalForm } from '../geometry/normalForm.ts'
import { toNormalForm, transportHeights } from '../geometry/transport.ts'
import { classFromHeights } from '../geometry/twoFaceClass.ts'
import type { CertificateRequest } from './certify.ts'

/**
 * What to certify, from an input of the headless evaluation: a polytope in any coordinates or a weight system,
 * heights and a rule. Heights are carried to the normal form.
 * @throws InputError as the evaluation; certificate.heights-not-fine
 */
export function certificateRequest(raw: unknown): CertificateRequest {
  const input = parsedInput(evaluationInputSchema, raw)
  const polytope = polytopeOfInput(input)
  const form = normalForm(polytope)
  const given = heightsOfInput(polytope, input.heights)
  const outcome = classFromHeights(polytope, given)
  if (!outcome.fine) {
    const [p] = outcome.unused
    throw new InputError(
      'certificate.heights-not-fine',
      `The heights leave ${outcome.unused.length} points unused, the first of them (${polytope.points.subarray(4 * p, 4 * p + 4).join(', ')}).`,
      'heights',
    )
  }
  const cls = toNormalForm(form, outcome.class)
  // Heights that tie give a class by the order of points, which another labelling would not respect.
  const carried = transportHeights(given, form.relabelling)
  const heights = isGeneric(cls, carried) ? carried : genericWitness(cls, carried)
  return {
    vertices: Array.from({ length: form.polytope.vertexCount }, (_, v) => [
      ...form.polytope.points.subarray(4 * v, 4 * v + 4),
    ]),
    heights,
    candidateKey: canonicalClass(form, cls).key,
    rule: input.rule ?? null,
  }
}
