import { useState } from 'react'
import { type PolytopeStructure } from '../../../shared/polytopeStructure.ts'
import { cornersOf, ReflexivePolygon } from '../../components/geometry/ReflexivePolygon.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted } from '../../lib/numbers.ts'

type Planar = PolytopeStructure['planar'][number]

/** Fibres whose surface everybody knows by another name. */
const names: Partial<Record<number, string>> = {
  1: 'projective plane',
  2: 'two projective lines',
  4: 'weights (1, 1, 2)',
  10: 'weights (1, 2, 3)',
}

/** Reflexive sections of a polytope: two-dimensional ones by type, with pictures, then three-dimensional ones. */
export function Sections({ planar, solid }: Pick<PolytopeStructure, 'planar' | 'solid'>) {
  if (planar.length === 0 && solid.length === 0) {
    return (
      <p>No reflexive section of dimension two or three: no class of this polytope is fibred torically.</p>
    )
  }
  const types = [...new Set(planar.map(({ type }) => type))].sort((a, b) => a - b)
  const nestedIn = (at: number) => solid.flatMap(({ nested }, s) => (nested.includes(at) ? [`k${s}`] : []))
  return (
    <div className="flex flex-col gap-5">
      <div>
        <h3 className="mb-2 text-sm font-medium">
          {someOrNo(planar.length, 'two-dimensional section')}, for genus-one fibrations
        </h3>
        {types.length > 0 && (
          <ul className="mb-3 flex flex-wrap items-end gap-x-6 gap-y-4">
            {types.map((type) => {
              const members = planar.filter((section) => section.type === type)
              return (
                <li key={type}>
                  <ReflexivePolygon
                    outline={members[0]?.outline ?? []}
                    label={`Reflexive polygon F${type}, ${counted(members[0]?.outline.length ?? 0, 'boundary point')}`}
                  />
                  <p className="mt-1 text-xs">
                    F{type} <span className="text-soft">× {members.length}</span>
                  </p>
                  <p className="text-xs text-soft">
                    {names[type] ?? `${cornersOf(members[0]?.outline ?? []).length} corners`}
                  </p>
                </li>
              )
            })}
          </ul>
        )}
        {planar.length > 0 && (
          <Listed
            label="Two-dimensional reflexive sections"
            heads={['e', 'Type', 'Boundary points', 'Prime toric divisors in it', 'Inside']}
            rows={planar.map((section: Planar, at) => [
              `e${at}`,
              `F${section.type}`,
              String(section.outline.length),
              divisorsIn(section.points),
              nestedIn(at).slice(0, 6).join(', ') + (nestedIn(at).length > 6 ? ', …' : '') || '–',
            ])}
          />
        )}
      </div>
      <div>
        <h3 className="mb-2 text-sm font-medium">
          {someOrNo(solid.length, 'three-dimensional section')}, for K3 fibrations
        </h3>
        {solid.length > 0 && (
          <Listed
            label="Three-dimensional reflexive sections"
            heads={['k', 'Lattice points', 'Vertices', 'Its vertices', 'Contains']}
            rows={solid.map(({ vertices, latticePoints, nested }, at) => [
              `k${at}`,
              String(latticePoints),
              String(vertices.length),
              divisorsIn(vertices),
              nested
                .slice(0, 6)
                .map((one) => `e${one}`)
                .join(', ') + (nested.length > 6 ? `, … (${nested.length})` : '') || '–',
            ])}
          />
        )}
      </div>
    </div>
  )
}

const someOrNo = (count: number, one: string) => (count === 0 ? `No ${one}` : counted(count, one))

const divisorsIn = (points: readonly number[]) =>
  points
    .slice(0, 12)
    .map((point) => `D${point}`)
    .join(' ') + (points.length > 12 ? ` … (${points.length})` : '')

const first = 12

function Listed({
  label,
  heads,
  rows,
}: {
  label: string
  heads: readonly string[]
  rows: readonly (readonly string[])[]
}) {
  const [all, setAll] = useState(false)
  const shown = all ? rows : rows.slice(0, first)
  return (
    <>
      <Table label={label} fit>
        <thead>
          <tr>
            {heads.map((head) => (
              <Th key={head}>{head}</Th>
            ))}
          </tr>
        </thead>
        <tbody>
          {shown.map((cells) => (
            <tr key={cells[0]}>
              {cells.map((text, at) => (
                <Td key={heads[at]} className={at === 0 ? 'text-soft' : 'tabular-nums'}>
                  {text}
                </Td>
              ))}
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > shown.length && (
        <Button className="mt-2" onClick={() => setAll(true)}>
          Show all {rows.length}
        </Button>
      )}
    </>
  )
}
