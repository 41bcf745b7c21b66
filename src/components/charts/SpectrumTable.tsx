import { Num } from '../ui/Num.tsx'
import { VirtualTable, type Column } from '../ui/VirtualTable.tsx'
import { type SpectrumBand, type SpectrumSeries } from './SpectrumPlot.tsx'

/** The numbers behind a spectrum plot; with a band its 5 %, 50 % and 95 % quantiles. */
export function SpectrumTable({
  title,
  series,
  band,
}: {
  title: string
  series: readonly SpectrumSeries[]
  band?: SpectrumBand
}) {
  const count = Math.max(...series.map(({ values }) => values.length))
  const columns: Column<number>[] = [
    { key: 'number', header: 'Number', numeric: true, cell: (at) => at + 1 },
    ...series.map(({ name, values }, place): Column<number> => ({
      key: `series-${place}`,
      header: name ?? 'Eigenvalue',
      numeric: true,
      cell: (at) => <Num value={values[at] ?? null} digits={6} />,
    })),
    ...(band
      ? ([
          [0, 'Null, 5 %'],
          [2, 'Null, median'],
          [4, 'Null, 95 %'],
        ] as const)
      : []
    ).map(([which, header]): Column<number> => ({
      key: header,
      header,
      numeric: true,
      cell: (at) => <Num value={(band && band.quantiles[at + 1 - band.from]?.[which]) ?? null} digits={4} />,
    })),
  ]
  return (
    <VirtualTable
      label={title}
      className="max-h-80"
      count={count}
      rowAt={(at) => at}
      rowKey={String}
      columns={columns}
    />
  )
}
