import { useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { ReflexivePolygon } from '../../components/geometry/ReflexivePolygon.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted } from '../../lib/numbers.ts'

type Fibrations = CandidateGeometry['fibrations']
type GenusOne = Fibrations['genusOne'][number]

/** Which reflexive sections of the polytope fibre this class, by K3 surfaces and by curves of genus one. */
export function FibrationSection({ fibrations }: { fibrations: Fibrations }) {
  const { k3, genusOne, nested, planarSections, solidSections } = fibrations
  return (
    <Section
      title="Fibrations"
      note={
        <>
          Toric ones: those this triangulation shows of the polytope’s{' '}
          {counted(planarSections, 'planar reflexive section')} (e) and {solidSections} in dimension three
          (k), numbered as on the polytope’s page. Others may exist.
        </>
      }
    >
      <div className="flex flex-col gap-5">
        <div>
          <h3 className="mb-2 text-sm font-medium">{someOrNo(genusOne.length, 'genus-one fibration')}</h3>
          {genusOne.length > 0 && (
            <Rows
              label="Genus-one fibrations"
              heads={['Fibre', 'Polygon', 'Base rays', 'Toric section', 'Inside K3 fibre']}
              count={genusOne.length}
              cells={(at) => {
                const fibration = genusOne[at] as GenusOne
                return [
                  <span key="fibre" className="flex items-center gap-2 py-1">
                    <ReflexivePolygon
                      outline={fibration.outline}
                      label={`Reflexive polygon F${fibration.type}`}
                    />
                    F{fibration.type}
                  </span>,
                  `e${fibration.section}`,
                  raysInWords(fibration.baseRays),
                  fibration.degree === 1 ? 'yes: elliptic' : `none; least degree ${fibration.degree}`,
                  listed(
                    nested.flatMap(([outer, inner]) => (inner === at ? [`k${k3[outer]?.section}`] : [])),
                  ),
                ]
              }}
            />
          )}
        </div>
        <div>
          <h3 className="mb-2 text-sm font-medium">{someOrNo(k3.length, 'K3 fibration')}</h3>
          {k3.length > 0 && (
            <Rows
              label="K3 fibrations"
              heads={['Hyperplane', 'Lattice points', 'Class of the fibre', 'Genus-one fibres inside']}
              count={k3.length}
              cells={(at) => [
                `k${k3[at]?.section}`,
                String(k3[at]?.latticePoints),
                fibreInWords(k3[at]?.fibre ?? []),
                listed(
                  nested.flatMap(([outer, inner]) => (outer === at ? [`e${genusOne[inner]?.section}`] : [])),
                ),
              ]}
            />
          )}
        </div>
      </div>
    </Section>
  )
}

const someOrNo = (count: number, one: string) => (count === 0 ? `No ${one}` : counted(count, one))

/** The first few of a list and how many there are. */
function listed(names: readonly string[], most = 6): string {
  if (names.length === 0) return '–'
  return names.slice(0, most).join(', ') + (names.length > most ? `, … (${names.length})` : '')
}

/** "D3 + 2 D5". */
export function fibreInWords(fibre: readonly (readonly [number, number])[]): string {
  const most = 5
  const terms = fibre.map(([point, coefficient]) => `${coefficient === 1 ? '' : `${coefficient} `}D${point}`)
  return terms.slice(0, most).join(' + ') + (terms.length > most ? ` + … (${terms.length} terms)` : '')
}

/** "3: (1, 0) (0, 1) (−1, −1)". */
export function raysInWords(rays: readonly (readonly [number, number])[]): string {
  const most = 4
  const shown = rays.slice(0, most).map((ray) => `(${ray.join(', ').replaceAll('-', '−')})`)
  return `${rays.length}: ${shown.join(' ')}${rays.length > most ? ' …' : ''}`
}

const first = 6

function Rows({
  label,
  heads,
  count,
  cells,
}: {
  label: string
  heads: readonly string[]
  count: number
  cells: (at: number) => readonly React.ReactNode[]
}) {
  const [all, setAll] = useState(false)
  const shown = all ? count : Math.min(count, first)
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
          {Array.from({ length: shown }, (_, at) => (
            <tr key={at}>
              {cells(at).map((content, column) => (
                <Td key={heads[column]} className="tabular-nums">
                  {content}
                </Td>
              ))}
            </tr>
          ))}
        </tbody>
      </Table>
      {count > shown && (
        <Button className="mt-2" onClick={() => setAll(true)}>
          Show all {count}
        </Button>
      )}
    </>
  )
}
