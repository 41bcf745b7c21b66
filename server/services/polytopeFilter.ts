import type { SelectQueryBuilder } from 'typeorm'
import { polytopeNumberNames, type PolytopeNumberName } from '../../shared/polytopeNumbers.ts'
import type { PolytopeFilter } from '../../shared/polytopes.ts'
import type { PolytopeRecord } from '../entities/polytope.ts'
import { mayReadCollection, visibleNames, type Viewer } from './visibility.ts'

/** SQL for a number of the library on the alias `polytope`: a column, but for what follows from others. */
export function numberColumn(name: PolytopeNumberName): string {
  return name === 'euler' ? '2 * (polytope.h11 - polytope.h21)' : `polytope.${name}`
}

/** Narrows a query of polytopes to those that match a filter. A number that is not known yet matches no range. */
export function applyFilter(
  query: SelectQueryBuilder<PolytopeRecord>,
  viewer: Viewer,
  filter: PolytopeFilter,
): void {
  for (const name of polytopeNumberNames) {
    const [low, high] = [filter[`${name}Min`], filter[`${name}Max`]]
    if (low !== undefined) query.andWhere(`${numberColumn(name)} >= :${name}Min`, { [`${name}Min`]: low })
    if (high !== undefined) query.andWhere(`${numberColumn(name)} <= :${name}Max`, { [`${name}Max`]: high })
  }
  if (filter.favourable !== undefined) {
    query.andWhere('polytope.favourable = :favourable', { favourable: filter.favourable === 'yes' })
  }
  if (filter.rigidBasis !== undefined) {
    query.andWhere(`polytope.rigidRank ${filter.rigidBasis === 'yes' ? '=' : '<'} polytope.h11`)
  }
  if (filter.fibre !== undefined) {
    query.andWhere('polytope.fibreTypes LIKE :fibre', { fibre: `% ${filter.fibre} %` })
  }
  if (filter.weighted !== undefined) {
    query.andWhere(`polytope.weights IS ${filter.weighted === 'yes' ? 'NOT NULL' : 'NULL'}`)
  }
  if (filter.origin !== undefined) query.andWhere('polytope.origin = :origin', { origin: filter.origin })
  if (filter.collection !== undefined) {
    query.andWhere(
      `polytope.key IN (SELECT held.polytopeKey FROM collection_polytope held
         JOIN collection ON collection.id = held.collectionId
         WHERE collection.id = :collection AND ${mayReadCollection(viewer)})`,
      { ...viewer, collection: filter.collection },
    )
  }
  const text = filter.text?.trim() ?? ''
  if (text !== '') applyText(query, viewer, text)
}

/** Part of a name, the beginning of a key, or five weights in any order. */
function applyText(query: SelectQueryBuilder<PolytopeRecord>, viewer: Viewer, text: string): void {
  const weights = weightsIn(text)
  if (weights !== null) {
    query.andWhere(
      `polytope.weights IS NOT NULL AND (SELECT group_concat(value, ' ') FROM
         (SELECT value FROM json_each(polytope.weights) ORDER BY value)) = :sorted`,
      { sorted: weights.join(' ') },
    )
    return
  }
  const conditions = [
    "(polytope.origin = 'bundled' AND polytope.name LIKE :part ESCAPE '\\')",
    `polytope.key IN (SELECT polytopeKey FROM (${visibleNames(viewer)}) WHERE name LIKE :part ESCAPE '\\')`,
  ]
  if (keyBeginning.test(text)) conditions.push('polytope.key LIKE :beginning')
  query.andWhere(`(${conditions.join(' OR ')})`, {
    ...viewer,
    part: `%${text.replace(/[\\%_]/g, '\\$&')}%`,
    beginning: `${text.toLowerCase()}%`,
  })
}

/** Shorter ones would match by chance. */
const keyBeginning = /^[0-9a-f]{4,32}$/i

/** Five positive integers, ascending and without common factor, as weight systems are stored. */
export function weightsIn(text: string): number[] | null {
  const words = text.split(/[\s,;]+/).filter((word) => word !== '')
  if (words.length !== 5 || words.some((word) => !/^[1-9]\d{0,8}$/.test(word))) return null
  const weights = words.map(Number).sort((a, b) => a - b)
  const divisor = weights.reduce((a, b) => {
    while (b !== 0) [a, b] = [b, a % b]
    return a
  })
  return weights.map((weight) => weight / divisor)
}
