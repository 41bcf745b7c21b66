import { caution } from '../caution.ts'
import { certifierVersion, independentRoad } from '../certify/independentRoad.ts'
import { scoringHash } from '../rules/hash.ts'
import { engineVersion } from '../version.ts'
import { fastClaims, type CertificateRequest } from './fastClaims.ts'
import { notCertified } from './notCertified.ts'
import { checkScore } from './scoreChecks.ts'
import type { Certificate } from './schema.ts'

export type { CertificateRequest }

/**
 * Certifies a candidate: the fast road's claims, the independent road from vertices and heights, and every
 * comparison of the two. All numbers refer to the canonical representative of the class; heights that tie
 * somewhere are replaced by others in general position inside the class.
 *
 * A disagreement is no error: the certificate then says `passed: false`. Deterministic but for the milliseconds.
 *
 * @param clock milliseconds from any origin; without one, every check takes 0
 * @throws InputError for input that is no candidate: see `fastClaims`
 */
export function certify(request: CertificateRequest, clock: () => number = () => 0): Certificate {
  const { claims, rule, heightsReplaced, units } = fastClaims(request)
  const { checks, certified } = independentRoad(claims, clock)
  const { score, favourable } = claims.numbers
  if (rule && score) checkScore(rule, score, certified, claims.candidateKey, checks)
  const list = checks.list(rule ? undefined : 'score')
  return {
    schema: 'tessellary.certificate/1',
    engineVersion,
    certifierVersion,
    polytopeKey: claims.polytopeKey,
    candidateKey: claims.candidateKey,
    scoringHash: rule && scoringHash(rule, engineVersion),
    rule: request.rule,
    vertices: claims.vertices.map(four),
    points: claims.points.map(four),
    heights: [...claims.heights],
    heightsReplaced,
    caution,
    units,
    passed: list.every(({ result }) => result === 'pass'),
    checks: list,
    notCertified: notCertified(favourable, rule),
    numbers: {
      ...claims.numbers,
      simplices: certified.fan?.simplices.map(four) ?? null,
    },
  }
}

const four = (row: readonly number[]): [number, number, number, number] => [row[0], row[1], row[2], row[3]]
