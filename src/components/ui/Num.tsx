import { formatFixed, formatNumber, numberParts } from '../../lib/numbers.ts'

interface NumProps {
  value: number | null
  digits?: number
  /** No exact integer, even when it is whole: keeps its decimals. */
  rounded?: boolean
  /** Decimals shared by a column (`columnDecimals`); they go before `digits`. */
  decimals?: number | null
  className?: string
}

/** A number as typeset text; copying it gives the raw value. */
export function Num({ value, digits = 4, rounded = false, decimals = null, className = '' }: NumProps) {
  if (value === null) return <span className="text-soft">–</span>
  const { mantissa, exponent } =
    decimals === null
      ? numberParts(value, digits, rounded)
      : { mantissa: formatFixed(value, decimals), exponent: null }
  return (
    <span
      data-raw={String(value)}
      title={String(value)}
      className={`whitespace-nowrap tabular-nums ${className}`}
    >
      {exponent === null ? (
        mantissa
      ) : (
        <>
          <span aria-hidden="true">
            {mantissa} × 10<sup className="text-[0.75em]">{String(exponent).replace('-', '−')}</sup>
          </span>
          <span className="sr-only">{formatNumber(value, digits)}</span>
        </>
      )}
    </span>
  )
}
