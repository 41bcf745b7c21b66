import { scaleColour } from '../../lib/colours.ts'
import { formatNumber } from '../../lib/numbers.ts'

/** Colours of points, each with what it stands for. */
export interface FaceColouring {
  readonly name: string
  /** Class of each point of the polytope. */
  readonly classOf: readonly number[]
  readonly classes: readonly { readonly label: string; readonly colour: string }[]
}

/** Most colours that can still be told apart. */
const mostClasses = 7

/**
 * Classes of values in ascending order: one per distinct value while there are few, else about equally many points
 * in each; equal values are never parted.
 */
export function classesOfValues(values: readonly number[], most = mostClasses): number[][] {
  const counts = new Map<number, number>()
  for (const value of values) counts.set(value, (counts.get(value) ?? 0) + 1)
  const distinct = [...counts.keys()].sort((a, b) => a - b)
  if (distinct.length <= most) return distinct.map((value) => [value])
  const groups: number[][] = []
  let group: number[] = []
  let inGroup = 0
  let left = values.length
  for (const value of distinct) {
    group.push(value)
    inGroup += counts.get(value) ?? 0
    if (groups.length < most - 1 && inGroup >= left / (most - groups.length)) {
      groups.push(group)
      left -= inGroup
      group = []
      inGroup = 0
    }
  }
  return group.length > 0 ? [...groups, group] : groups
}

/** Points coloured by a number, from light to dark (on dark the other way), with the range of each colour. */
export function colouringBy(name: string, exact: readonly number[]): FaceColouring {
  // Values that differ by rounding only are one colour.
  const values = exact.map((value) => Number(value.toPrecision(6)))
  const groups = classesOfValues(values)
  const place = new Map<number, number>()
  groups.forEach((group, at) => group.forEach((value) => place.set(value, at)))
  const word = (value: number | undefined) => formatNumber(value ?? 0, 3)
  return {
    name,
    classOf: values.map((value) => place.get(value) ?? 0),
    classes: groups.map((group, at) => ({
      label: group.length === 1 ? word(group[0]) : `${word(group[0])} to ${word(group.at(-1))}`,
      colour: scaleColour(groups.length === 1 ? 0.3 : (0.85 * at) / (groups.length - 1)),
    })),
  }
}

const carriers = ['vertex', 'inside an edge', 'inside a 2-face']

/** Points coloured by where they lie: on the boundary of their 2-faces or inside. */
export function colouringByCarrier(carrierDimension: readonly number[]): FaceColouring {
  return {
    name: 'Points by carrier',
    classOf: carrierDimension,
    classes: carriers.map((label, at) => ({ label, colour: scaleColour([0.8, 0.4, 0][at] ?? 0) })),
  }
}
