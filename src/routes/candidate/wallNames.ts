import { type ConeSliceView } from '../../../shared/coneSlices.ts'

type Wall = ConeSliceView['nearest'][number]

/** A wall by what it is: "curve D3·D7", with how many more edges give the same class, or "circuit". */
export function wallName({ edges }: Pick<Wall, 'edges'>): string {
  const [first] = edges
  if (!first) return 'circuit'
  const more = edges.length - 1
  return `curve D${first[0]}·D${first[1]}${more > 0 ? ` and ${more} more` : ''}`
}
