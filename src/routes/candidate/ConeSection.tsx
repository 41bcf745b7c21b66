import { useState } from 'react'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { type ConeSliceView } from '../../../shared/coneSlices.ts'
import { coneSliceQuery } from '../../api/candidates.ts'
import { Section } from '../../components/ui/Layout.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { useSeen } from '../../lib/useSeen.ts'
import { ConeSlice } from './ConeSlice.tsx'
import { wallName } from './wallNames.ts'

/** A plane through the reference point: the cone that is counted, its walls, and the stretched cone. */
export function ConeSection({ geometry }: { geometry: CandidateGeometry }) {
  const [place, seen] = useSeen()
  const [first, setFirst] = useState('wall-0')
  const [second, setSecond] = useState('wall-1')
  const slice = useQuery({
    ...coneSliceQuery(geometry.key, { first, second }),
    enabled: seen,
    placeholderData: keepPreviousData,
  })
  const choices = choicesOf(geometry, slice.data)
  return (
    <div ref={place}>
      <Section
        title="Slice of the cone"
        note="A plane through the reference point, drawn to scale in the norm over all prime toric divisors. The cone is the one that is counted: curves of all edges, and all circuits that the fans of this class allow; the true Kähler cone contains it."
      >
        <div className="mb-3 flex flex-wrap gap-x-4 gap-y-2 print:hidden">
          <Select
            label="To the right"
            className="w-72 max-w-full"
            value={first}
            onChange={(event) => setFirst(event.target.value)}
            options={choices.filter(([value]) => value !== second)}
          />
          <Select
            label="Upwards, the other way"
            className="w-72 max-w-full"
            value={second}
            onChange={(event) => setSecond(event.target.value)}
            options={choices.filter(([value]) => value !== first)}
          />
        </div>
        {seen ? (
          <QueryView query={slice} what="the slice">
            {(data) => (
              <ConeSlice key={data.key} slice={data} names={[first, second].map(shortName(choices))} />
            )}
          </QueryView>
        ) : (
          <p className="h-96 text-soft">Cut when this comes into view.</p>
        )}
      </Section>
    </div>
  )
}

type Choice = readonly [value: string, label: string]

const shortName = (choices: readonly Choice[]) => (value: string) =>
  value.startsWith('divisor-')
    ? `along D${value.slice(8)}`
    : value === 'ray'
      ? 'along the ray'
      : (choices.find(([one]) => one === value)?.[1].split(',')[0] ?? '')

function choicesOf(geometry: CandidateGeometry, slice?: ConeSliceView): Choice[] {
  const walls = slice?.nearest ?? []
  const known = walls.map(
    (wall, at) =>
      [`wall-${at}`, `to wall ${at + 1}, ${wallName(wall)}, at ${formatNumber(wall.distance, 3)}`] as const,
  )
  return [
    ...(known.length > 0
      ? known
      : ([
          ['wall-0', 'to wall 1, the nearest'],
          ['wall-1', 'to wall 2, the next'],
        ] as const)),
    ['ray', 'along the ray outwards'],
    ...geometry.divisors.map((_, point) => [`divisor-${point}`, `along D${point}`] as const),
  ]
}
