import { type z } from 'zod'
import { type rateSchema } from '../../../shared/outcomes.ts'
import { formatNumber, formatPercent } from '../../lib/numbers.ts'

/** A rate with its 95 % interval; with no hit at all, the bound that can be given instead. */
export function Rate({ rate }: { rate: z.infer<typeof rateSchema> }) {
  const { hits, size } = rate
  if (hits === 0) {
    return (
      <span data-raw={0}>
        none in {formatNumber(size)}: below {formatPercent(rate.high)}{' '}
        <span className="text-soft">(95 %)</span>
      </span>
    )
  }
  return (
    <span data-raw={rate.rate}>
      {formatPercent(rate.rate)}{' '}
      <span className="text-soft">
        ({formatPercent(rate.low)} to {formatPercent(rate.high)}, 95 %; {formatNumber(hits)} of{' '}
        {formatNumber(size)})
      </span>
    </span>
  )
}
