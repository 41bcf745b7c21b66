import { useWidth } from '../../lib/useWidth.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { Num } from '../ui/Num.tsx'
import { Table, Td, Th } from '../ui/Table.tsx'
import { BottomAxis, LeftAxis } from './Axis.tsx'
import { ChartFrame } from './ChartFrame.tsx'
import { linearScale, logScale } from './scales.ts'

const height = 260
const top = 28
const bottom = height - 40
const left = 62

/** Eigenvalues in ascending order on a logarithmic axis. */
export function SpectrumPlot({
  title,
  values,
  note,
  file,
}: {
  title: string
  values: readonly number[]
  note?: string
  file: string
}) {
  const [frame, width] = useWidth<HTMLDivElement>(480)
  const right = width - 12
  const positive = values.filter((value) => value > 0)
  const low = Math.min(...positive)
  const high = Math.max(...positive)
  const x = linearScale(1, Math.max(2, values.length), left, right, Math.min(6, values.length))
  const y = logScale(low / 1.5, high * 1.5, bottom, top)
  const radius = values.length > 200 ? 1.6 : values.length > 60 ? 2.2 : 3.2
  return (
    <ChartFrame
      title={title}
      note={note}
      file={file}
      table={
        <Table label={title}>
          <thead>
            <tr>
              <Th numeric>Number</Th>
              <Th numeric>Eigenvalue</Th>
            </tr>
          </thead>
          <tbody>
            {values.map((value, at) => (
              <tr key={at}>
                <Td numeric>{at + 1}</Td>
                <Td numeric>
                  <Num value={value} digits={6} />
                </Td>
              </tr>
            ))}
          </tbody>
        </Table>
      }
    >
      <div ref={frame}>
        {positive.length > 0 && (
          <svg
            data-chart
            width={width}
            height={height}
            role="img"
            aria-label={`${title}: ${values.length} eigenvalues from ${formatNumber(low)} to ${formatNumber(high)}`}
            className="block"
          >
            <BottomAxis
              scale={x}
              label="number, ascending"
              left={left}
              right={right}
              top={top}
              bottom={bottom}
            />
            <LeftAxis scale={y} label="eigenvalue" left={left} right={right} top={top} bottom={bottom} />
            {values.map(
              (value, at) =>
                value > 0 && (
                  <circle key={at} cx={x(at + 1)} cy={y(value)} r={radius} className="fill-action">
                    <title>{`${at + 1}: ${formatNumber(value, 6)}`}</title>
                  </circle>
                ),
            )}
          </svg>
        )}
      </div>
    </ChartFrame>
  )
}
